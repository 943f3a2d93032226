import { useQuery } from '@tanstack/react-query';
import { useEffect, useMemo, useState } from 'react';
import { rigQueries } from '@/lib/queries/units';
import { rangesAt, rigUseOf, UNKNOWN_RIG, type RigUse } from '../model/rig-use';
import { useLiveBench } from './live-bench-context';

export interface RigUseState {
  readonly use: RigUse;
  readonly ranges: readonly string[];
  readonly setRange: (range: string) => void;
  /** The rig's books could not be read: its limit isn't known. */
  readonly isUnread: boolean;
}

/** What the books say of the rig on the bench; told to the bench, so that its limit holds for every sound. */
export function useRigUse(rigId: string | null, sampleRateHz: number): RigUseState {
  const bench = useLiveBench();
  const [range, setRange] = useState<string | null>(null);
  const { data, isError, isPending } = useQuery({
    ...rigQueries.liveSettings(rigId ?? ''),
    enabled: rigId !== null,
  });
  const use = useMemo(
    () => (data && rigId !== null ? rigUseOf(data, sampleRateHz, range) : UNKNOWN_RIG),
    [data, rigId, sampleRateHz, range],
  );
  useEffect(() => void bench.setUse(use), [bench, use]);
  return {
    use,
    ranges: data && rigId !== null ? rangesAt(data, sampleRateHz) : [],
    setRange,
    isUnread: rigId !== null && (isError || isPending),
  };
}
