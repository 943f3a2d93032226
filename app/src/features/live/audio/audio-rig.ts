import type { PracticeDevice } from '@benchlark/dsp';
import captureUrl from './capture.worklet.ts?worker&url';
import generatorUrl from './generator.worklet.ts?worker&url';
import { openInterface, watchDevices } from './open-interface';
import practiceUrl from './practice.worklet.ts?worker&url';
import type { ToneRequest } from './tone-source';
import { readerOf } from './track-reader';
import { CAPTURE, GENERATOR, PRACTICE } from './worklet-names';

/** Where the sound goes and where it is heard. */
export type RigChoice =
  | { readonly kind: 'practice'; readonly device: PracticeDevice; readonly sampleRateHz: number }
  | {
      readonly kind: 'interface';
      /** Device ids as the browser gives them; empty: the system's own choice. */
      readonly inputId: string;
      readonly outputId: string;
      readonly sampleRateHz: number;
    };

/** What the browser really delivers, as it says itself. */
export interface Delivered {
  readonly inputLabel: string;
  readonly outputLabel: string;
  readonly askedRateHz: number;
  readonly inputRateHz: number;
  readonly outputRateHz: number;
  readonly channelCount: number;
  /** Processing that is on though it was asked to be off. */
  readonly processing: readonly string[];
  /** False: the browser can't send sound to a chosen output, so that the system's own is used. */
  readonly isOutputChosen: boolean;
  /** Samples read off the track itself, or by a worklet within the audio clock. */
  readonly path: 'track' | 'worklet';
}

/** The way the samples leave this thread; both are transferred to the worker. */
export type InputFeed =
  | { readonly kind: 'track'; readonly readable: ReadableStream<AudioData> }
  | { readonly kind: 'port'; readonly port: MessagePort };

export interface RigEvents {
  /** The input is gone: unplugged, or its permission was taken back. */
  readonly onInputEnded: () => void;
  /** The output that was chosen is gone; the system may play elsewhere. */
  readonly onOutputEnded: () => void;
  readonly onInputMuted: (isMuted: boolean) => void;
}

export interface Playing {
  /** Seconds since the first sample went out; never more than the whole. */
  readonly elapsedS: () => number;
  readonly ended: Promise<void>;
  /** Fades out and ends. */
  readonly stop: () => void;
}

const FADE_S = 0.02;
const SETTLE_S = 0.05;

/** An open way out and in. One at a time: `close` it before another is opened. */
export class AudioRig {
  readonly delivered: Delivered;
  readonly #context: AudioContext;
  readonly #bus: GainNode;
  readonly #generator: AudioWorkletNode;
  readonly #practice: AudioWorkletNode | null;
  readonly #track: MediaStreamTrack;
  readonly #feed: InputFeed;
  readonly #stopWatching: () => void;

  private constructor(parts: {
    delivered: Delivered;
    context: AudioContext;
    bus: GainNode;
    generator: AudioWorkletNode;
    practice: AudioWorkletNode | null;
    track: MediaStreamTrack;
    feed: InputFeed;
    stopWatching: () => void;
  }) {
    this.delivered = parts.delivered;
    this.#context = parts.context;
    this.#bus = parts.bus;
    this.#generator = parts.generator;
    this.#practice = parts.practice;
    this.#track = parts.track;
    this.#feed = parts.feed;
    this.#stopWatching = parts.stopWatching;
  }

  /**
   * Opens the way out and in.
   *
   * @throws LiveFault what a person can do something about: no permission, no such device, a rate that can't be
   */
  static async open(choice: RigChoice, events: RigEvents): Promise<AudioRig> {
    const ends =
      choice.kind === 'practice'
        ? {
            context: new AudioContext({ sampleRate: choice.sampleRateHz, latencyHint: 'playback' }),
            input: null,
          }
        : await openInterface(choice);
    const { context } = ends;
    try {
      await context.resume();
      for (const url of [generatorUrl, practiceUrl, captureUrl]) await context.audioWorklet.addModule(url);
      const generator = new AudioWorkletNode(context, GENERATOR, {
        numberOfInputs: 0,
        outputChannelCount: [2],
      });
      const bus = new GainNode(context, { channelCount: 2, channelCountMode: 'explicit' });
      generator.connect(bus);
      const practice = choice.kind === 'practice' ? practiceNode(context, choice.device) : null;
      const track = ends.input?.track ?? practiceTrack(context, bus, practice);
      if (ends.input) bus.connect(context.destination);
      track.addEventListener('ended', events.onInputEnded);
      const stopWatching =
        choice.kind === 'practice'
          ? () => undefined
          : watchDevices(
              { inputId: track.getSettings().deviceId ?? choice.inputId, outputId: choice.outputId },
              (which) => (which === 'input' ? events.onInputEnded() : events.onOutputEnded()),
            );
      track.addEventListener('mute', () => events.onInputMuted(true));
      track.addEventListener('unmute', () => events.onInputMuted(false));
      const feed = feedOf(context, track);
      const delivered: Delivered = {
        inputLabel: ends.input?.label ?? 'practice device',
        outputLabel: ends.input?.outputLabel ?? 'practice device',
        askedRateHz: choice.sampleRateHz,
        inputRateHz: ends.input?.rateHz ?? context.sampleRate,
        outputRateHz: context.sampleRate,
        channelCount: ends.input?.channelCount ?? 2,
        processing: ends.input?.processing ?? [],
        isOutputChosen: ends.input?.isOutputChosen ?? true,
        path: feed.kind === 'track' ? 'track' : 'worklet',
      };
      return new AudioRig({ delivered, context, bus, generator, practice, track, feed, stopWatching });
    } catch (reason) {
      ends.input?.track.stop();
      await context.close();
      throw reason;
    }
  }

  get sampleRateHz(): number {
    return this.#context.sampleRate;
  }

  /** To be transferred to the worker, once. */
  get feed(): InputFeed {
    return this.#feed;
  }

  setTone(request: ToneRequest | null): void {
    this.#generator.port.postMessage(request);
  }

  setDevice(device: PracticeDevice): void {
    this.#practice?.port.postMessage(device);
  }

  /** Plays samples once, from a whole frame on: a start between frames would interpolate. */
  play(channels: readonly Float32Array<ArrayBuffer>[]): Playing {
    const context = this.#context;
    const length = channels[0]?.length ?? 1;
    const buffer = new AudioBuffer({
      numberOfChannels: channels.length,
      length,
      sampleRate: context.sampleRate,
    });
    channels.forEach((samples, index) => buffer.copyToChannel(samples, index));
    const fade = new GainNode(context);
    const node = new AudioBufferSourceNode(context, { buffer });
    node.connect(fade).connect(this.#bus);
    const startS = Math.ceil((context.currentTime + SETTLE_S) * context.sampleRate) / context.sampleRate;
    const ended = new Promise<void>((resolve) => {
      node.onended = () => {
        fade.disconnect();
        resolve();
      };
    });
    node.start(startS);
    return {
      elapsedS: () => Math.min(length / context.sampleRate, Math.max(0, context.currentTime - startS)),
      ended,
      stop: () => {
        const now = context.currentTime;
        fade.gain.setValueAtTime(1, now);
        fade.gain.linearRampToValueAtTime(0, now + FADE_S);
        node.stop(now + 2 * FADE_S);
      },
    };
  }

  async close(): Promise<void> {
    this.#stopWatching();
    this.setTone(null);
    this.#track.stop();
    if (this.#context.state !== 'closed') await this.#context.close();
  }
}

function practiceNode(context: AudioContext, device: PracticeDevice): AudioWorkletNode {
  return new AudioWorkletNode(context, PRACTICE, {
    outputChannelCount: [2],
    channelCount: 2,
    channelCountMode: 'explicit',
    processorOptions: { device },
  });
}

/** Through the device into a track, as an interface's input is one: no sound leaves the computer. */
function practiceTrack(
  context: AudioContext,
  bus: GainNode,
  practice: AudioWorkletNode | null,
): MediaStreamTrack {
  const end = new MediaStreamAudioDestinationNode(context, { channelCount: 2 });
  bus.connect(practice ?? end);
  practice?.connect(end);
  // Without a source that never ends the last part of a block would be lost.
  const keepAlive = new ConstantSourceNode(context, { offset: 0 });
  keepAlive.connect(end);
  keepAlive.start();
  const [track] = end.stream.getAudioTracks();
  if (!track) throw new TypeError('the practice device has no track');
  return track;
}

/** The track itself where the browser lets it be read: that path loses nothing while this thread is busy. */
function feedOf(context: AudioContext, track: MediaStreamTrack): InputFeed {
  const readable = readerOf(track);
  if (readable) return { kind: 'track', readable };
  const node = new AudioWorkletNode(context, CAPTURE, { numberOfOutputs: 0 });
  const { port1, port2 } = new MessageChannel();
  node.port.postMessage(port1, [port1]);
  context.createMediaStreamSource(new MediaStream([track])).connect(node);
  return { kind: 'port', port: port2 };
}
