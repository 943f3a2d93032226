import { useCallback } from 'react';
import { useSearchParams } from 'react-router-dom';
import { readChosen, readFilter, writeChosen, writeFilter } from '../model/archive-filter';
import type { ArchiveFilter } from '../model/archive-filter';

/** The archive's view as the address has it, and the ways to change it. */
export function useArchiveView() {
  const [params, setParams] = useSearchParams();
  const changeFilter = useCallback(
    (change: Partial<ArchiveFilter>) =>
      setParams(
        (current) => writeFilter({ ...readFilter(current), ...change }, writeChosen(new Set(), current)),
        {
          replace: true,
          preventScrollReset: true,
        },
      ),
    [setParams],
  );
  const changeChosen = useCallback(
    (chosen: ReadonlySet<number>) =>
      setParams((current) => writeChosen(chosen, current), { replace: true, preventScrollReset: true }),
    [setParams],
  );
  return { filter: readFilter(params), chosen: readChosen(params), changeFilter, changeChosen };
}
