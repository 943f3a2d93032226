import { SlotSelect } from '@/components/sentence/slot';
import type { ServedBody } from '../../api/record-queries';
import { levelChoices } from '../../model/level-axis';
import type { LevelAgainst } from '../../model/level-axis';

const WORDS: Record<LevelAgainst, { label: string; detail: string }> = {
  stimulus: { label: 'the stimulus', detail: 'as it was played' },
  recorder: { label: 'the recorder\u2019s full scale', detail: 'as it was recorded' },
  unit: { label: 'the unit\u2019s full scale', detail: 'what it gives for 0 dBFS' },
};

interface LevelSlotProps {
  body: ServedBody;
  value: LevelAgainst;
  onChange: (against: LevelAgainst) => void;
}

/** Whose level the axis carries; only what the record knows is offered. */
export function LevelSlot({ body, value, onChange }: LevelSlotProps) {
  const choices = levelChoices(body);
  return (
    <SlotSelect
      label="Levels against"
      value={value}
      options={choices.map((choice) => ({ value: choice, ...WORDS[choice] }))}
      onChange={onChange}
    />
  );
}
