import { Sentence, SlotPopover, SlotSelect } from '@/components/sentence/slot';
import { TextInput } from '@/components/forms/field';
import type { Rig, Unit } from '@/lib/api-schema';
import { MEASURE_CHOICES, measureTitle, STATE_WORDS, unitName } from '@/lib/capture-words';
import { formatDate } from '@/lib/format/date';
import { UNSORTED } from '../model/archive-filter';
import type { ArchiveFilter } from '../model/archive-filter';

const ANY = 'any';

export interface FilterSentenceProps {
  filter: ArchiveFilter;
  units: readonly Unit[];
  rigs: readonly Rig[];
  onChange: (change: Partial<ArchiveFilter>) => void;
}

/** The filters of the archive as one sentence; a word is changed to change it. */
export function FilterSentence({ filter, units, rigs, onChange }: FilterSentenceProps) {
  return (
    <Sentence>
      Show <StateSlot filter={filter} onChange={onChange} /> of{' '}
      <SlotSelect
        label="Unit"
        value={filter.isUnsorted ? UNSORTED : (filter.unitId ?? ANY)}
        options={[
          { value: ANY, label: 'any unit' },
          { value: UNSORTED, label: 'no unit yet', detail: 'unsorted' },
          ...units.map((unit) => ({ value: unit.id, label: unitName(unit) })),
        ]}
        onChange={(unit) =>
          onChange({
            unitId: unit === ANY || unit === UNSORTED ? null : unit,
            isUnsorted: unit === UNSORTED,
            conditionId: null,
          })
        }
      />{' '}
      <ConditionSlot filter={filter} units={units} onChange={onChange} />
      measured as{' '}
      <SlotSelect
        label="Measure"
        value={filter.measure ?? ANY}
        options={[
          { value: ANY, label: 'anything' },
          ...MEASURE_CHOICES.map((measure) => ({ value: measure, label: measureTitle(measure) })),
        ]}
        onChange={(measure) => onChange({ measure: measure === ANY ? null : measure })}
      />{' '}
      on{' '}
      <SlotSelect
        label="Rig"
        value={filter.rigId ?? ANY}
        options={[
          { value: ANY, label: 'any rig' },
          ...rigs.map(({ id, name }) => ({ value: id, label: name })),
        ]}
        onChange={(rig) => onChange({ rigId: rig === ANY ? null : rig })}
      />
      , <DaySlots filter={filter} onChange={onChange} />,{' '}
      <SlotSelect
        label="Warnings"
        value={filter.warnings ?? ANY}
        options={[
          { value: ANY, label: 'with or without warnings' },
          { value: 'with', label: 'with warnings' },
          { value: 'without', label: 'without warnings' },
        ]}
        onChange={(warnings) => onChange({ warnings: warnings === ANY ? null : warnings })}
      />
      .
    </Sentence>
  );
}

type SlotProps = Pick<FilterSentenceProps, 'filter' | 'onChange'>;

function StateSlot({ filter, onChange }: SlotProps) {
  const states = Object.entries(STATE_WORDS) as [NonNullable<ArchiveFilter['state']>, string][];
  return (
    <SlotSelect
      label="State"
      value={filter.state ?? ANY}
      options={[
        { value: ANY, label: 'captures' },
        ...states.map(([value, words]) => ({ value: value, label: `captures (${words})` })),
      ]}
      onChange={(state) =>
        onChange({ state: state === ANY ? null : (states.find(([value]) => value === state)?.[0] ?? null) })
      }
    />
  );
}

/** A condition is asked for only once a unit is named: two units' "as received" are not one. */
function ConditionSlot({ filter, units, onChange }: Omit<FilterSentenceProps, 'rigs'>) {
  const unit = units.find(({ id }) => id === filter.unitId);
  if (!unit) return null;
  return (
    <>
      in{' '}
      <SlotSelect
        label="Condition"
        value={filter.conditionId ?? ANY}
        options={[
          { value: ANY, label: 'any condition' },
          ...unit.conditions.map(({ id, name }) => ({ value: id, label: name })),
        ]}
        onChange={(condition) => onChange({ conditionId: condition === ANY ? null : condition })}
      />
      ,{' '}
    </>
  );
}

function DaySlots({ filter: { since, until }, onChange }: SlotProps) {
  return (
    <SlotPopover label="Days" text={daysWords(since, until)}>
      {() => (
        <>
          <TextInput
            label="Since"
            type="date"
            value={since ?? ''}
            onChange={(event) => onChange({ since: event.target.value || null })}
          />
          <TextInput
            label="Until"
            type="date"
            value={until ?? ''}
            onChange={(event) => onChange({ until: event.target.value || null })}
          />
          <p className="bl-popover-words">
            <button type="button" className="bl-word" onClick={() => onChange({ since: null, until: null })}>
              At any time
            </button>
          </p>
        </>
      )}
    </SlotPopover>
  );
}

function daysWords(since: string | null, until: string | null): string {
  if (since && until) return `from ${formatDate(since)} to ${formatDate(until)}`;
  if (since) return `since ${formatDate(since)}`;
  return until ? `until ${formatDate(until)}` : 'at any time';
}
