import { NewestCaptures } from '@/components/captures/newest-captures';
import { NoRows } from '@/components/states/states';
import type { Unit } from '@/lib/api-schema';

/** The newest captures of a unit; the archive has them all. */
export function UnitCaptures({ unit }: { unit: Unit }) {
  return (
    <NewestCaptures
      filter={{ unitId: unit.id }}
      archiveAddress={`/archive?unit=${unit.id}`}
      label="Captures of this unit"
      filing={{
        head: 'condition',
        cell: ({ condition, rig }) => (
          <>
            {condition?.name}
            <span className="bl-table-second">{rig?.name}</span>
          </>
        ),
      }}
      none={
        <NoRows asked="Nothing was measured of this unit yet.">
          File a recording under it in the archive.
        </NoRows>
      }
    />
  );
}
