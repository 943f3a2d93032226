import type { Slot } from './chart-model';

const RADIUS = 3.4;

/** An open marker of a slot's shape about a point, as SVG path data. */
export function markerPath(slot: Slot, x: number, y: number): string {
  const r = RADIUS;
  if (slot === 2 || slot === 6) return `M${x - r} ${y - r}h${2 * r}v${2 * r}h${-2 * r}Z`;
  if (slot === 3) return `M${x} ${y - r * 1.2}l${r * 1.1} ${r * 2}h${-2.2 * r}Z`;
  if (slot === 4)
    return `M${x} ${y - r * 1.3}l${r * 1.15} ${r * 1.3}l${-r * 1.15} ${r * 1.3}l${-r * 1.15} ${-r * 1.3}Z`;
  return `M${x - r} ${y}a${r} ${r} 0 1 0 ${2 * r} 0a${r} ${r} 0 1 0 ${-2 * r} 0Z`;
}
