import { SlotSelect } from '@/components/sentence/slot';
import type { Rig, Unit } from '@/lib/api-schema';
import { unitName } from '@/lib/capture-words';

export interface FilingValue {
  readonly unitId: string | null;
  readonly conditionId: string | null;
  readonly rigId: string | null;
}

const NONE = 'none';

export interface FilingSlotsProps {
  units: readonly Unit[];
  rigs: readonly Rig[];
  value: FilingValue;
  onChange: (value: FilingValue) => void;
  /** Offers to put a new rig on the books. */
  onNewRig?: () => void;
}

const NEW_RIG = 'new';

/** "[Kestrel Works Pebble 3], [as received], on [Attic rig]": where a capture belongs. A condition is the unit's own. */
export function FilingSlots({ units, rigs, value, onChange, onNewRig }: FilingSlotsProps) {
  const unit = units.find(({ id }) => id === value.unitId);
  const conditions = unit?.conditions ?? [];
  return (
    <>
      <SlotSelect
        label="Unit"
        value={unit?.id ?? NONE}
        options={[
          { value: NONE, label: 'no unit yet', detail: 'unsorted' },
          ...units.map((item) => ({ value: item.id, label: unitName(item) })),
        ]}
        onChange={(next) =>
          onChange({
            ...value,
            unitId: next === NONE ? null : next,
            conditionId: firstCondition(units, next),
          })
        }
      />
      {unit && (
        <>
          {', '}
          <SlotSelect
            label="Condition"
            value={conditions.some(({ id }) => id === value.conditionId) ? (value.conditionId ?? NONE) : NONE}
            options={[
              { value: NONE, label: 'no condition yet' },
              ...conditions.map(({ id, name }) => ({ value: id, label: name })),
            ]}
            onChange={(next) => onChange({ ...value, conditionId: next === NONE ? null : next })}
          />
        </>
      )}
      {', on '}
      <SlotSelect
        label="Rig"
        value={rigs.some(({ id }) => id === value.rigId) ? (value.rigId ?? NONE) : NONE}
        options={[
          { value: NONE, label: 'no rig named' },
          ...rigs.map(({ id, name }) => ({ value: id, label: name })),
          ...(onNewRig ? [{ value: NEW_RIG, label: 'a new rig' }] : []),
        ]}
        onChange={(next) => {
          if (next === NEW_RIG) onNewRig?.();
          else onChange({ ...value, rigId: next === NONE ? null : next });
        }}
      />
    </>
  );
}

/** A unit with a single condition needs no second choice. */
function firstCondition(units: readonly Unit[], unitId: string): string | null {
  const conditions = units.find(({ id }) => id === unitId)?.conditions ?? [];
  return conditions.length === 1 ? (conditions[0]?.id ?? null) : null;
}
