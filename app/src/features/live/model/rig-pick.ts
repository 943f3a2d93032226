import { z } from 'zod';

export const RATES_HZ = [44_100, 48_000, 88_200, 96_000, 176_400, 192_000] as const;

/** What a person chose to work on; remembered for each rig. */
export interface RigPick {
  readonly kind: 'practice' | 'interface';
  readonly inputId: string;
  readonly outputId: string;
  readonly sampleRateHz: number;
}

export const DEFAULT_PICK: RigPick = { kind: 'practice', inputId: '', outputId: '', sampleRateHz: 96_000 };

const KEY = 'benchlark.live-rig';

const pickShape = z.object({
  kind: z.enum(['practice', 'interface']),
  inputId: z.string(),
  outputId: z.string(),
  sampleRateHz: z.number().refine((rate) => RATES_HZ.some((one) => one === rate)),
});

/** What was chosen on this rig last time. */
export function readPick(rigId: string | null): RigPick {
  try {
    const kept = pickShape.safeParse(JSON.parse(localStorage.getItem(`${KEY}.${rigId ?? 'none'}`) ?? 'null'));
    return kept.success ? kept.data : DEFAULT_PICK;
  } catch {
    return DEFAULT_PICK; // not written by this page
  }
}

export function keepPick(rigId: string | null, pick: RigPick): void {
  localStorage.setItem(`${KEY}.${rigId ?? 'none'}`, JSON.stringify(pick));
}
