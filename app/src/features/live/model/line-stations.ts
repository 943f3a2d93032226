import type { Station } from '@/components/line/the-line';
import { formatNumber } from '@/lib/format/number';
import {
  formatFrequency,
  formatLevel,
  formatPoints,
  formatSampleRate,
  withUnit,
} from '@/lib/format/quantity';
import type { LiveState } from './live-state';
import { tonesOf, type LiveForm } from './live-form';

/** Below it nothing comes back worth the name. */
const HEARD_DBFS = -100;
/** So near to the end of the scale there is nothing to spare. */
const NEAR_END_DBFS = -0.2;

/** What sounds now, in a few words. */
export function soundWords(form: LiveForm, levelDbfs: number): string {
  const tones = tonesOf(form).map((hz) => formatFrequency(hz));
  return `${tones.join(' and ')}, ${formatLevel(levelDbfs)}`;
}

/** Whether anything that is played comes back. */
export function isHeard({ input }: Pick<LiveState, 'input'>): boolean {
  return input !== null && Math.max(...input.peaksDbfs) > HEARD_DBFS;
}

export function lineStations(state: LiveState, form: LiveForm, unit: string, rigName: string): Station[] {
  const { delivered, input, playing, take, choice } = state;
  if (!delivered || !input) {
    return [
      { name: 'source', what: 'closed', node: 'here' },
      { name: 'unit', what: unit, node: 'box', link: 'unchecked' },
      { name: 'interface', what: 'closed', node: 'not-yet' },
      { name: 'analysis', what: 'nothing to look at', node: 'not-yet' },
      { name: 'archive', what: 'not kept', node: 'not-yet', grow: 0.7 },
    ];
  }
  const isSounding = playing !== null || take?.phase === 'playing';
  const peak = Math.max(...input.peaksDbfs);
  const back = !isSounding ? 'silent' : input.isOverloaded ? 'clipping' : isHeard(state) ? 'sound' : 'cut';
  const kept = state.takes.length;
  return [
    {
      name: 'source',
      what: delivered.outputLabel,
      more: take
        ? `${take.title}, ${formatSampleRate(delivered.outputRateHz)}`
        : playing
          ? soundWords(playing.form, playing.levelDbfs)
          : `silent, ${formatSampleRate(delivered.outputRateHz)}`,
      node: 'done',
      link: isSounding ? 'sound' : 'silent',
    },
    {
      name: 'unit',
      what: choice?.kind === 'practice' ? 'practice device' : unit,
      more: choice?.kind === 'practice' ? choice.device.name : rigName,
      node: 'box',
      link: back,
    },
    {
      name: 'interface',
      what: delivered.inputLabel,
      more: interfaceWords(state, peak, isSounding),
      node: 'done',
      link: back === 'cut' ? 'silent' : back,
      tone: back === 'cut' || input.isOverloaded ? 'fault' : 'plain',
    },
    {
      name: 'analysis',
      what: take ? phaseWords(take.phase) : `${formatPoints(form.fftLength)} points`,
      more: analysisWords(state),
      node: 'done',
      link: 'unchecked',
    },
    {
      name: 'archive',
      what: kept === 0 ? 'not kept' : `${kept} ${kept === 1 ? 'take' : 'takes'} here`,
      more: kept === 0 ? 'K keeps it' : 'see the margin',
      node: kept === 0 ? 'not-yet' : 'done',
      grow: 0.7,
    },
  ];
}

function phaseWords(phase: 'making' | 'playing' | 'measuring'): string {
  return phase === 'making' ? 'making the signal' : phase === 'playing' ? 'recording' : 'measuring';
}

function interfaceWords({ input, isMuted }: LiveState, peakDbfs: number, isSounding: boolean): string {
  if (!input) return '';
  if (isMuted) return 'muted by the system';
  const rate = formatSampleRate(input.sampleRateHz);
  if (input.isOverloaded || peakDbfs > NEAR_END_DBFS + 0.2) return `at the end of its scale, ${rate}`;
  if (isSounding && peakDbfs <= HEARD_DBFS) return 'nothing comes back: check cable, mute, power';
  return `peak ${formatLevel(peakDbfs)}, ${rate}`;
}

function analysisWords({ spectrum, input, isHeld }: LiveState): string {
  const gaps =
    input && input.breakCount > 0
      ? `${input.breakCount} damaged ${input.breakCount === 1 ? 'block' : 'blocks'} left out`
      : 'no gaps';
  if (isHeld) return `held, ${gaps}`;
  if (!spectrum) return gaps;
  return `${withUnit(formatNumber(spectrum.tookMs, { decimals: 0 }), 'ms')} a picture, ${gaps}`;
}
