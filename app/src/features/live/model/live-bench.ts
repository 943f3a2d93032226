import { SELF_CHECK_DURATION_S, type PracticeDevice, type StimulusDescriptor } from '@benchlark/dsp';
import { proxy, type Remote } from 'comlink';
import { AudioRig, type InputFeed, type Playing, type RigChoice } from '../audio/audio-rig';
import { LiveFault, liveFaultOf } from '../audio/live-fault';
import type { TakeStore } from '../store/take-store';
import type { InputState, LiveSink, Look, RigSettings, TakeRequest, TakeResult } from '../worker/live-types';
import type { LiveWorkerApi } from '../worker/live.worker';
import { transferFeed } from '../worker/transfer-feed';
import { cappedLevelDbfs, spanOf, steadyTones, stimulusOptions, tonesOf, type LiveForm } from './live-form';
import { CLOSED, type LiveState, type TakeProgress } from './live-state';
import { UNKNOWN_RIG, type RigUse } from './rig-use';
import { statementOf, takeFileName, type Filing, type LocalTake } from './take';
import { signalOf, type SignalKind } from './take-kinds';

export interface LiveBenchParts {
  readonly startWorker: () => { readonly api: Remote<LiveWorkerApi>; readonly stop: () => void };
  readonly openRig: typeof AudioRig.open;
  readonly store: TakeStore;
  readonly now: () => Date;
  readonly newId: () => string;
}

/** What a take is filed under and held to. */
export interface TakeOrders {
  readonly form: LiveForm;
  readonly filing: Filing;
  /** Unit and rig in words, for the file itself. */
  readonly description: string;
}

const PRE_ROLL_S = 0.3;
/** A device's delay and the way through the system end within it. */
const TAIL_S = 0.7;
const RISE_FROM_DBFS = -40;
const RISE_S = 3;
const CHANGE_S = 0.1;
const MOST_ATTEMPTS = 3;
const TICK_MS = 100;
const INPUT_GONE = 'The input is gone: it was unplugged, or its permission taken back.';
const CLOSE_S = 1;
/** Any stretch without damage serves as well as the whole. */
const STEADY_MEASURES: ReadonlySet<string> = new Set(['tone', 'two-tone', 'idle', 'jitter']);

const wait = (seconds: number): Promise<void> =>
  new Promise((resolve) => setTimeout(resolve, seconds * 1000));

/**
 * The bench: one rig, one worker, what sounds, what is taken. It stands outside of React; the page reads its state and
 * gives orders. Every change replaces the state.
 */
export class LiveBench {
  #state: LiveState = CLOSED;
  readonly #parts: LiveBenchParts;
  readonly #listeners = new Set<() => void>();
  #worker: { readonly api: Remote<LiveWorkerApi>; readonly stop: () => void } | null = null;
  #rig: AudioRig | null = null;
  #playing: Playing | null = null;
  #use: RigUse = UNKNOWN_RIG;
  /** Why the take under way is to end before its time. */
  #stopWhy: string | null = null;
  #takeBeganMs = 0;

  constructor(parts: LiveBenchParts) {
    this.#parts = parts;
  }

  readonly subscribe = (listener: () => void): (() => void) => {
    this.#listeners.add(listener);
    return () => {
      this.#listeners.delete(listener);
    };
  };

  readonly state = (): LiveState => this.#state;

  /** Takes of this browser that an earlier page left behind. */
  async loadTakes(): Promise<void> {
    this.#set({ takes: await this.#parts.store.all() });
  }

  async open(choice: RigChoice): Promise<void> {
    await this.close();
    this.#set({ rig: 'opening', choice, fault: null, notice: null });
    try {
      const rig = await this.#parts.openRig(choice, {
        onInputEnded: () => void this.#lose(INPUT_GONE),
        onOutputEnded: () =>
          void this.#lose('The output is gone: it was unplugged, and the system may play elsewhere.'),
        onInputMuted: (isMuted) => this.#set({ isMuted }),
      });
      this.#rig = rig;
      const worker = this.#parts.startWorker();
      this.#worker = worker;
      await this.#listen(worker.api, rig.feed);
      this.#set({ rig: 'open', delivered: rig.delivered });
    } catch (reason) {
      await this.close();
      this.#set({ fault: liveFaultOf(reason), choice });
    }
  }

  async close(): Promise<void> {
    this.#playing?.stop();
    const [rig, worker] = [this.#rig, this.#worker];
    this.#rig = null;
    this.#worker = null;
    const { takes, notes } = this.#state;
    this.#state = { ...CLOSED, takes, notes };
    this.#tell();
    worker?.stop();
    // A context whose device is gone may never say that it is closed.
    await Promise.race([rig?.close(), wait(CLOSE_S)]);
  }

  setDevice(device: PracticeDevice): void {
    const { choice } = this.#state;
    if (choice?.kind !== 'practice') return;
    this.#rig?.setDevice(device);
    this.#set({ choice: { ...choice, device } });
    void this.#worker?.api.noteChange(0);
  }

  /** What the books say of the rig; a lower limit holds at once. */
  async setUse(use: RigUse): Promise<void> {
    if (use === this.#use) return;
    this.#use = use;
    const { playing } = this.#state;
    if (playing && playing.levelDbfs > use.limitDbfs) await this.play(playing.form);
    else if (playing) await this.setLook(playing.form);
  }

  /** Plays a steady signal, or changes the one that plays. A first one begins quietly and rises. */
  async play(form: LiveForm): Promise<void> {
    const rig = this.#rig;
    if (!rig || this.#state.take) return;
    const levelDbfs = cappedLevelDbfs(form, this.#use.limitDbfs);
    const isFirst = this.#state.playing === null;
    const rampS = isFirst && levelDbfs > RISE_FROM_DBFS ? RISE_S : CHANGE_S;
    rig.setTone({
      tones: steadyTones(form, levelDbfs),
      channels: form.channels,
      rampS,
      riseFromPeak: 10 ** (RISE_FROM_DBFS / 20),
    });
    this.#set({
      playing: { form, levelDbfs, sinceMs: this.#state.playing?.sinceMs ?? Date.now() },
      isHeld: false,
      notice: null,
    });
    await this.#look(form, tonesOf(form));
    await this.#worker?.api.noteChange(rampS);
    // Once the level stands, what came before it leaves the averages.
    await wait(rampS);
    if (this.#state.playing?.form === form) await this.#worker?.api.noteChange(0);
  }

  /** How the picture is made, without touching what sounds. */
  async setLook(form: LiveForm): Promise<void> {
    const { playing } = this.#state;
    await this.#look(form, playing ? tonesOf(playing.form) : []);
  }

  /** Ends whatever sounds: the tone, or the take under way. */
  async stop(why = 'Stopped.'): Promise<void> {
    if (this.#state.take) {
      this.#stopWhy = why;
      this.#playing?.stop();
      return;
    }
    this.#rig?.setTone(null);
    const { playing } = this.#state;
    this.#set({ playing: null });
    if (playing) {
      await this.#look(playing.form, []);
      await this.#worker?.api.noteChange(0);
    }
  }

  hold(isHeld: boolean): void {
    this.#set({ isHeld });
  }

  setReference(isKept: boolean): void {
    this.#set({ reference: isKept ? this.#state.spectrum : null });
  }

  addNote(text: string): void {
    const atS = this.#takeBeganMs > 0 ? (Date.now() - this.#takeBeganMs) / 1000 : 0;
    this.#set({ notes: [...this.#state.notes, { atS: Math.round(atS * 10) / 10, text }] });
  }

  /** Sends a chirp out of each output and finds it again. */
  async checkItself(): Promise<void> {
    const { rig, api } = this.#opened();
    await this.stop();
    this.#set({ selfCheck: 'running' });
    try {
      const channels = await api.renderSelfCheck(rig.sampleRateHz);
      await api.startRecording();
      const playing = rig.play(channels);
      await playing.ended;
      await wait(SELF_CHECK_DURATION_S / 2);
      this.#set({ selfCheck: await api.finishSelfCheck() });
    } catch (reason) {
      this.#set({ selfCheck: null, notice: messageOf(reason) });
    }
  }

  /** Keeps the last moments of the tone that plays as a take. */
  async keepTone(orders: TakeOrders): Promise<LocalTake | null> {
    const { playing } = this.#state;
    const { api } = this.#opened();
    if (!playing) return null;
    const startedAt = this.#parts.now().toISOString();
    const kind = signalOf(playing.form.signalId);
    const request = this.#request(kind, orders, startedAt, null);
    try {
      const result = await api.keepNewest(
        request,
        proxy(() => undefined),
      );
      return await this.#putAway(result, { kind, orders, startedAt, descriptor: null, series: null });
    } catch (reason) {
      this.#set({ notice: messageOf(reason) });
      return null;
    }
  }

  /** Plays, records and measures; as often as asked. What is measured is in this browser's keeping at once. */
  async runTake(orders: TakeOrders): Promise<void> {
    const { form } = orders;
    const kind = signalOf(form.signalId);
    if (kind.stimulus === null || this.#state.take) return;
    await this.stop();
    this.#stopWhy = null;
    this.#set({ notice: null, notes: [], isHeld: false });
    const series = form.times > 1 ? this.#parts.newId() : null;
    try {
      for (let index = 1; index <= form.times && this.#stopWhy === null; index += 1) {
        await this.#takeOnce(kind, orders, series === null ? null : { id: series, index, count: form.times });
      }
    } catch (reason) {
      this.#set({ notice: messageOf(reason) });
    } finally {
      this.#playing = null;
      this.#takeBeganMs = 0;
      this.#set({ take: null, ...(this.#stopWhy === null ? {} : { notice: this.#stopWhy }) });
      await this.#worker?.api.dropRecording();
    }
  }

  async update(take: LocalTake): Promise<void> {
    await this.#parts.store.put(take);
    this.#set({ takes: this.#state.takes.map((one) => (one.id === take.id ? take : one)) });
  }

  async remove(id: string): Promise<void> {
    await this.#parts.store.remove(id);
    this.#set({ takes: this.#state.takes.filter((one) => one.id !== id) });
  }

  async #takeOnce(
    kind: SignalKind,
    orders: TakeOrders,
    series: { id: string; index: number; count: number } | null,
  ): Promise<void> {
    for (let attempt = 1; attempt <= MOST_ATTEMPTS; attempt += 1) {
      const progress = {
        title: kind.label,
        index: series?.index ?? 1,
        count: series?.count ?? 1,
        attempt,
      };
      const { api, rig } = this.#opened();
      this.#progress(progress, 'making', 0, null);
      const options = stimulusOptions(orders.form, kind, {
        sampleRateHz: rig.sampleRateHz,
        limitDbfs: this.#use.limitDbfs,
      });
      const { channels, descriptor } = await api.render(kind.stimulus ?? '', options);
      await this.#look(orders.form, []);
      const startedAt = this.#parts.now().toISOString();
      await this.#playAndRecord(channels, progress);
      this.#progress(progress, 'measuring', 0, null);
      const request = this.#request(kind, orders, startedAt, descriptor);
      const result = await api.finishRecording(
        request,
        proxy((share: number) => this.#progress(progress, 'measuring', share, null)),
      );
      const isDamaged = result.breaks.length > 0 && !STEADY_MEASURES.has(kind.measure);
      if (isDamaged && attempt < MOST_ATTEMPTS && this.#stopWhy === null) {
        this.#set({ notice: `Damaged blocks came in (${result.breaks.length}): the take is repeated.` });
        continue;
      }
      await this.#putAway(result, { kind, orders, startedAt, descriptor, series });
      return;
    }
  }

  async #playAndRecord(
    channels: readonly Float32Array<ArrayBuffer>[],
    progress: Omit<TakeProgress, 'phase' | 'share' | 'leftS'>,
  ): Promise<void> {
    const { api, rig } = this.#opened();
    const totalS = (channels[0]?.length ?? 0) / rig.sampleRateHz;
    await api.noteChange(0);
    await api.startRecording();
    this.#takeBeganMs = Date.now();
    await wait(PRE_ROLL_S);
    const playing = rig.play(channels);
    this.#playing = playing;
    const tick = setInterval(() => {
      const elapsedS = playing.elapsedS();
      this.#progress(progress, 'playing', elapsedS / totalS, totalS - elapsedS);
    }, TICK_MS);
    try {
      await playing.ended;
      await wait(TAIL_S);
    } finally {
      clearInterval(tick);
      this.#playing = null;
    }
  }

  #request(
    kind: SignalKind,
    { form, description }: TakeOrders,
    startedAt: string,
    descriptor: StimulusDescriptor | null,
  ): TakeRequest {
    return {
      measure: kind.measure,
      descriptor,
      bandLowHz: spanOf(form).bandHz[0],
      bandHighHz: spanOf(form).bandHz[1],
      isPractice: this.#state.choice?.kind === 'practice',
      startedAt,
      description,
      ...this.#known(),
    };
  }

  /** A practice device is no rig: nothing that was measured on one holds for it. */
  #known(): RigSettings {
    const isReal = this.#state.choice?.kind === 'interface';
    return {
      calibration: isReal ? (this.#use.calibration?.content ?? null) : null,
      baseline: isReal ? (this.#use.baseline?.content ?? null) : null,
    };
  }

  async #putAway(
    result: TakeResult,
    about: {
      kind: SignalKind;
      orders: TakeOrders;
      startedAt: string;
      descriptor: StimulusDescriptor | null;
      series: { id: string; index: number; count: number } | null;
    },
  ): Promise<LocalTake> {
    const { kind, orders, startedAt, descriptor, series } = about;
    const { delivered } = this.#state;
    if (!delivered) throw new Error('the rig is closed');
    const isPractice = this.#state.choice?.kind === 'practice';
    const take: LocalTake = {
      id: this.#parts.newId(),
      fileName: takeFileName(kind.id, startedAt, isPractice),
      title: kind.label,
      wav: result.wav,
      sha256: result.sha256,
      record: result.record,
      failure: result.failure,
      statement: statementOf({
        kind: kind.id,
        measure: kind.measure,
        descriptor,
        startedAt,
        isPractice,
        delivered,
        result,
        notes: this.#state.notes,
        series,
        calibrationId: isPractice ? null : (this.#use.calibration?.id ?? null),
        baselineId: isPractice ? null : (this.#use.baseline?.id ?? null),
      }),
      filing: orders.filing,
      madeAt: startedAt,
      isKept: false,
      isOverloaded: result.isOverloaded,
    };
    await this.#parts.store.put(take);
    this.#set({ takes: [take, ...this.#state.takes] });
    return take;
  }

  async #listen(api: Remote<LiveWorkerApi>, feed: InputFeed): Promise<void> {
    const sink: LiveSink = {
      onSpectrum: (spectrum) => {
        if (!this.#state.isHeld) this.#set({ spectrum });
      },
      onFigures: (figures) => {
        if (!this.#state.isHeld) this.#set({ figures });
      },
      onState: (input) => this.#hear(input),
      onEnd: (why) => void this.#lose(why ?? INPUT_GONE),
    };
    await api.open(transferFeed(feed), this.#rig?.sampleRateHz ?? 0, proxy(sink));
  }

  #hear(input: InputState): void {
    this.#set({ input });
    if (input.isOverloaded && this.#state.take?.phase === 'playing') {
      void this.stop(
        'The input reached the end of its scale: turn its gain or the level down. What was recorded is kept.',
      );
    }
  }

  /** The rig broke away: what is being taken ends with what there is. */
  async #lose(why: string): Promise<void> {
    if (!this.#rig) return;
    const { choice, take } = this.#state;
    if (take?.phase === 'playing') {
      await this.stop(why);
      return;
    }
    const closing = this.close();
    this.#set({ choice, fault: new LiveFault(why, 'Plug it in and open the rig again.') });
    await closing;
  }

  async #look(form: LiveForm, tonesHz: readonly number[]): Promise<void> {
    const look: Look = {
      fftLength: form.fftLength,
      averages: form.averages,
      bandLowHz: spanOf(form).bandHz[0],
      bandHighHz: spanOf(form).bandHz[1],
      tonesHz,
      ...this.#known(),
    };
    await this.#worker?.api.setLook(look);
  }

  #opened(): { rig: AudioRig; api: Remote<LiveWorkerApi> } {
    if (!this.#rig || !this.#worker) throw new LiveFault('No rig is open.', 'Open one first.');
    return { rig: this.#rig, api: this.#worker.api };
  }

  #progress(
    about: Omit<TakeProgress, 'phase' | 'share' | 'leftS'>,
    phase: TakeProgress['phase'],
    share: number,
    leftS: number | null,
  ): void {
    this.#set({ take: { ...about, phase, share, leftS } });
  }

  #set(change: Partial<LiveState>): void {
    this.#state = { ...this.#state, ...change };
    this.#tell();
  }

  #tell(): void {
    for (const listener of this.#listeners) listener();
  }
}

function messageOf(reason: unknown): string {
  const text = reason instanceof Error ? reason.message : String(reason);
  const sentence = text.charAt(0).toUpperCase() + text.slice(1);
  return sentence.endsWith('.') ? sentence : `${sentence}.`;
}
