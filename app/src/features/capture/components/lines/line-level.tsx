import { Figure } from '@/components/figures/figure';

/** The level of one line: its unit beside it, no mark, as lists of lines carry no limits. */
export function LineLevel({
  figureKey,
  value,
}: {
  figureKey: 'levelDbfs' | 'levelDbr';
  value: number | null;
}) {
  return (
    <Figure
      figureKey={figureKey}
      value={value}
      integerCh={4}
      fractionCh={2}
      uncertaintyCh={0}
      hasWorth={false}
      hasUnit={value !== null}
    />
  );
}
