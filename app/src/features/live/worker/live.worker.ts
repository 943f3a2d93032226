import {
  createStimulus,
  renderSelfCheck,
  type StimulusDescriptor,
  type StimulusOptions,
} from '@benchlark/dsp';
import { expose, transfer } from 'comlink';
import { renderStimulus } from '@/lib/render-samples';
import type { InputFeed } from '../audio/audio-rig';
import { LiveDesk } from './live-desk';
import type { LiveSink, Look, TakeRequest } from './live-types';
import { readFeed } from './read-feed';

let desk: LiveDesk | null = null;

function theDesk(): LiveDesk {
  if (!desk) throw new Error('no rig is open');
  return desk;
}

/** What the page asks of the worker; errors come back as plain `Error`s. */
const api = {
  /** Reads the feed until it ends. */
  open: (feed: InputFeed, fallbackRateHz: number, sink: LiveSink): void => {
    const opened = new LiveDesk(fallbackRateHz, {
      onFigures: (picture) => sink.onFigures(picture),
      onState: (state) => sink.onState(state),
      onEnd: (why) => sink.onEnd(why),
      onSpectrum: (picture) =>
        sink.onSpectrum(
          transfer(
            picture,
            picture.levels.map(({ buffer }) => buffer),
          ),
        ),
    });
    desk = opened;
    readFeed(feed, (block) => opened.take(block)).then(
      () => sink.onEnd(null),
      (reason: unknown) => sink.onEnd(reason instanceof Error ? reason.message : String(reason)),
    );
  },
  setLook: (look: Look) => theDesk().setLook(look),
  noteChange: (lastsS: number) => theDesk().noteChange(lastsS),
  startRecording: () => theDesk().startRecording(),
  dropRecording: () => theDesk().dropRecording(),
  finishRecording: (request: TakeRequest, onProgress: (share: number) => void) =>
    theDesk().finishRecording(request, onProgress),
  keepNewest: (request: TakeRequest, onProgress: (share: number) => void) =>
    theDesk().keepNewest(request, onProgress),
  finishSelfCheck: () => theDesk().finishSelfCheck(),
  /** A stimulus as samples to play, and what it says of itself. */
  render: async (
    name: string,
    options: Omit<StimulusOptions, 'bitsPerSample' | 'dither'>,
  ): Promise<{ channels: Float32Array<ArrayBuffer>[]; descriptor: StimulusDescriptor }> => {
    const channels: Float32Array<ArrayBuffer>[] = [];
    const stimulus = createStimulus(name, { ...options, bitsPerSample: '32f' });
    for (let index = 0; index < stimulus.source.channelCount; index += 1)
      channels.push(new Float32Array(stimulus.source.frameCount));
    await renderStimulus(name, options, ({ fromFrame, channels: part }) =>
      part.forEach((samples, index) => channels[index]?.set(samples, fromFrame)),
    );
    return transfer(
      { channels, descriptor: stimulus.describe('') },
      channels.map(({ buffer }) => buffer),
    );
  },
  renderSelfCheck: (sampleRateHz: number): Float32Array<ArrayBuffer>[] =>
    renderSelfCheck(sampleRateHz).map((samples) => Float32Array.from(samples)),
};

export type LiveWorkerApi = typeof api;

expose(api);
