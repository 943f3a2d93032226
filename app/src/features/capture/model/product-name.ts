import { MINUS } from '@/lib/format/number';

function term(order: number, tone: string): string {
  const size = Math.abs(order);
  return `${size === 1 ? '' : size}${tone}`;
}

/** A product of two tones as it is written: "f2−f1", "2f1−f2", "f2+2f1". The positive term stands first. */
export function productName(lowOrder: number, highOrder: number): string {
  const parts = [
    { order: highOrder, text: term(highOrder, 'f2') },
    { order: lowOrder, text: term(lowOrder, 'f1') },
  ].filter(({ order }) => order !== 0);
  parts.sort((a, b) => Number(b.order > 0) - Number(a.order > 0));
  return parts
    .map(
      ({ order, text }, index) => (index === 0 ? (order < 0 ? MINUS : '') : order < 0 ? MINUS : '+') + text,
    )
    .join('');
}
