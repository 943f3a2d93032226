import { STIMULUS_KINDS, type MeasureId } from '@benchlark/dsp';

/** What can be played at the bench: a steady signal until it is stopped, or a take that ends by itself. */
export interface SignalKind {
  readonly id: string;
  /** After "Play" or "Take", in the sentence. */
  readonly label: string;
  readonly detail: string;
  /** The stimulus of a take; null plays until it is stopped. */
  readonly stimulus: string | null;
  readonly measure: MeasureId;
  readonly options?: { readonly isQuick?: boolean };
}

const STEADY: readonly SignalKind[] = [
  { id: 'tone', label: 'a steady tone', detail: 'until you stop it', stimulus: null, measure: 'tone' },
  {
    id: 'pair',
    label: 'two steady tones',
    detail: 'until you stop them',
    stimulus: null,
    measure: 'two-tone',
  },
];

const take = (id: string, label: string, detail: string, stimulus = id, isQuick?: boolean): SignalKind => {
  const kind = STIMULUS_KINDS.find(({ name }) => name === stimulus);
  if (!kind) throw new TypeError(`there is no stimulus ${stimulus}`);
  return {
    id,
    label,
    detail,
    stimulus,
    measure: kind.measure,
    ...(isQuick === undefined ? {} : { options: { isQuick } }),
  };
};

const TAKES: readonly SignalKind[] = [
  take('tone-take', 'a take of a tone', '10 s', 'sine'),
  take('idle', 'a take of silence', 'noise, hum, lines', 'silence'),
  take('low-level-tone', 'a quiet tone', 'dynamic range'),
  take('modulation-pair', 'a low and a high tone', 'modulation'),
  take('difference-pair', 'two high tones', 'difference tones'),
  take('level-steps', 'level steps', 'does the output follow'),
  take('modulation-steps', 'a low and a high tone in steps', 'modulation against level'),
  take('difference-steps', 'two high tones in steps', 'difference tones against level'),
  take('sweep', 'a sweep', 'response and harmonics'),
  take('multitone', 'many tones at once', 'as in music'),
  take('separation', 'each channel by itself', 'separation and balance'),
  take('jitter-test', 'the jitter test', 'clock'),
  take('intersample-tone', 'a tone between samples', 'headroom'),
  take('white-noise', 'white noise', 'the filter'),
  take('quick-programme', 'the quick programme', 'half a minute', 'programme', true),
  take('programme', 'the programme', 'two minutes, every measure', 'programme', false),
];

export const SIGNALS: readonly SignalKind[] = [...STEADY, ...TAKES];

export function signalOf(id: string): SignalKind {
  const found = SIGNALS.find((kind) => kind.id === id) ?? SIGNALS[0];
  if (!found) throw new TypeError('there are no signals');
  return found;
}
