import type { SelfCheckResult } from '@benchlark/dsp';
import type { LiveFault } from '../audio/live-fault';
import type { Delivered, RigChoice } from '../audio/audio-rig';
import type { FiguresPicture, InputState, SpectrumPicture } from '../worker/live-types';
import type { LiveForm } from './live-form';
import type { LocalTake, TakeNote } from './take';

/** A take under way. */
export interface TakeProgress {
  readonly title: string;
  readonly phase: 'making' | 'playing' | 'measuring';
  /** 0 to 1 of this phase. */
  readonly share: number;
  readonly leftS: number | null;
  readonly index: number;
  readonly count: number;
  /** 2 and 3: the one before held damaged blocks. */
  readonly attempt: number;
}

export interface LiveState {
  readonly rig: 'closed' | 'opening' | 'open';
  readonly choice: RigChoice | null;
  readonly fault: LiveFault | null;
  readonly delivered: Delivered | null;
  readonly input: InputState | null;
  readonly isMuted: boolean;
  /** The steady signal that sounds, as it was asked for. */
  readonly playing: { readonly form: LiveForm; readonly levelDbfs: number; readonly sinceMs: number } | null;
  readonly isHeld: boolean;
  readonly spectrum: SpectrumPicture | null;
  readonly figures: FiguresPicture | null;
  /** A spectrum kept for comparison while others come and go. */
  readonly reference: SpectrumPicture | null;
  readonly take: TakeProgress | null;
  readonly notes: readonly TakeNote[];
  readonly selfCheck: 'running' | SelfCheckResult | null;
  /** Takes in this browser's keeping, newest first. */
  readonly takes: readonly LocalTake[];
  /** What happened that a person should know: a take that was stopped, a repeat. */
  readonly notice: string | null;
}

export const CLOSED: LiveState = {
  rig: 'closed',
  choice: null,
  fault: null,
  delivered: null,
  input: null,
  isMuted: false,
  playing: null,
  isHeld: false,
  spectrum: null,
  figures: null,
  reference: null,
  take: null,
  notes: [],
  selfCheck: null,
  takes: [],
  notice: null,
};
