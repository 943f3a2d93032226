import type { Slot } from './chart-model';

/** Resolved colours: a canvas can't read CSS variables. */
export interface Palette {
  readonly paper: string;
  readonly plot: string;
  readonly ink: string;
  readonly ink2: string;
  readonly ink3: string;
  readonly minor: string;
  readonly major: string;
  readonly frame: string;
  readonly floor: string;
  readonly mask: string;
  readonly cursor: string;
  readonly highlight: string;
  readonly traces: readonly string[];
}

const TOKENS = {
  paper: '--bl-paper',
  plot: '--bl-plot',
  ink: '--bl-ink',
  ink2: '--bl-ink-2',
  ink3: '--bl-ink-3',
  minor: '--bl-grat-minor',
  major: '--bl-grat-major',
  frame: '--bl-frame',
  floor: '--bl-floor',
  mask: '--bl-mask',
  cursor: '--bl-cursor',
  highlight: '--bl-highlight',
} as const;

/** The tokens as they hold on an element now. */
export function readPalette(element: Element): Palette {
  const style = getComputedStyle(element);
  const token = (name: string) => style.getPropertyValue(name).trim();
  const named = Object.fromEntries(Object.entries(TOKENS).map(([key, name]) => [key, token(name)]));
  const traces = [1, 2, 3, 4, 5, 6].map((slot) => token(`--bl-trace-${slot}`));
  return { ...(named as Record<keyof typeof TOKENS, string>), traces };
}

/** The light palette whatever the page's theme: exports and print are on paper. */
export function readLightPalette(): Palette {
  const probe = document.createElement('div');
  probe.className = 'light';
  probe.hidden = true;
  document.body.append(probe);
  const palette = readPalette(probe);
  probe.remove();
  return palette;
}

export function traceColour(palette: Palette, slot: Slot): string {
  return palette.traces[slot - 1] ?? palette.ink;
}
