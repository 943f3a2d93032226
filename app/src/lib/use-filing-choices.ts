import { useQuery } from '@tanstack/react-query';
import type { Rig, Unit } from './api-schema';
import { rigQueries, unitQueries } from './queries/units';

/** The units (with their conditions) and rigs that a capture can be filed under; empty until they have come. */
export function useFilingChoices(): { units: readonly Unit[]; rigs: readonly Rig[] } {
  const units = useQuery(unitQueries.list(''));
  const rigs = useQuery(rigQueries.list());
  return { units: units.data?.items ?? [], rigs: rigs.data?.items ?? [] };
}
