import { useCallback, useState } from 'react';
import { z } from 'zod';
import { AVERAGES, DEFAULT_FORM, FFT_LENGTHS, type LiveForm } from '../model/live-form';
import { SIGNALS } from '../model/take-kinds';

const KEY = 'benchlark.live-form';

const formShape = z.object({
  signalId: z.string().refine((id) => SIGNALS.some((kind) => kind.id === id)),
  frequencyHz: z.number().positive(),
  lowFrequencyHz: z.number().positive(),
  highFrequencyHz: z.number().positive(),
  channels: z.enum(['both', 'left', 'right']),
  spanId: z.enum(['audible', 'low', 'wide', 'close']),
  fftLength: z.number().refine((length) => FFT_LENGTHS.some((one) => one === length)),
  averages: z.number().refine((count) => AVERAGES.some((one) => one === count)),
  times: z.int().min(1).max(10),
});

/** The sentence as it was left on this rig, but for its level: a new day starts quietly. */
function readForm(rigId: string | null): LiveForm {
  try {
    const kept = formShape.safeParse(JSON.parse(localStorage.getItem(`${KEY}.${rigId ?? 'none'}`) ?? 'null'));
    return kept.success ? { ...DEFAULT_FORM, ...kept.data } : DEFAULT_FORM;
  } catch {
    return DEFAULT_FORM; // what another program left there is no sentence of ours
  }
}

/** The sentence of the Live page, remembered for each rig. */
export function useLiveForm(rigId: string | null): [LiveForm, (change: Partial<LiveForm>) => LiveForm] {
  const [held, setHeld] = useState(() => ({ rigId, form: readForm(rigId) }));
  const form = held.rigId === rigId ? held.form : readForm(rigId);
  const change = useCallback(
    (part: Partial<LiveForm>) => {
      const next = { ...form, ...part };
      setHeld({ rigId, form: next });
      localStorage.setItem(`${KEY}.${rigId ?? 'none'}`, JSON.stringify(next));
      return next;
    },
    [form, rigId],
  );
  return [form, change];
}
