import { LiveFault } from './live-fault';

export interface OpenedInput {
  readonly track: MediaStreamTrack;
  readonly label: string;
  readonly outputLabel: string;
  readonly rateHz: number;
  readonly channelCount: number;
  readonly processing: readonly string[];
  readonly isOutputChosen: boolean;
}

export interface InterfaceChoice {
  readonly inputId: string;
  readonly outputId: string;
  readonly sampleRateHz: number;
}

const LOOK_MS = 2000;

/** Each of these mixes, bends or cuts what comes in. */
const PROCESSING = {
  echoCancellation: 'echo cancellation',
  noiseSuppression: 'noise suppression',
  autoGainControl: 'automatic gain',
} as const;

/** Inputs and outputs by name; names come only once an input has been allowed. */
export async function listDevices(): Promise<{ inputs: MediaDeviceInfo[]; outputs: MediaDeviceInfo[] }> {
  const devices = (await mediaDevices().enumerateDevices()).filter(({ deviceId }) => deviceId !== '');
  return {
    inputs: devices.filter(({ kind }) => kind === 'audioinput'),
    outputs: devices.filter(({ kind }) => kind === 'audiooutput'),
  };
}

/** Only secure addresses have any: this computer's own name, or https. */
export function mediaDevices(): MediaDevices {
  const found: MediaDevices | undefined = navigator.mediaDevices;
  if (!found) {
    throw new LiveFault(
      'This address is not secure, so the browser gives no input.',
      'Open Benchlark under https, or on the computer that it runs on.',
    );
  }
  return found;
}

/**
 * Opens an input with every processing off, and a context at the rate that the input really has: the browser would
 * resample silently between two.
 *
 * @throws DOMException as the browser refuses; LiveFault on an address that isn't secure
 */
export async function openInterface(
  choice: InterfaceChoice,
): Promise<{ context: AudioContext; input: OpenedInput }> {
  const stream = await mediaDevices().getUserMedia({
    audio: {
      ...(choice.inputId === '' ? {} : { deviceId: { exact: choice.inputId } }),
      echoCancellation: false,
      noiseSuppression: false,
      autoGainControl: false,
      channelCount: { ideal: 2 },
      sampleRate: { ideal: choice.sampleRateHz },
    },
  });
  const [track] = stream.getAudioTracks();
  if (!track) throw new LiveFault('The input gives no sound.', 'Choose another input.');
  try {
    const settings = track.getSettings();
    const context = contextAt(settings.sampleRate ?? null, choice.sampleRateHz);
    const isOutputChosen = await sendTo(context, choice.outputId);
    const { outputs } = await listDevices();
    const output = outputs.find(({ deviceId }) => deviceId === choice.outputId);
    return {
      context,
      input: {
        track,
        label: track.label || 'input',
        outputLabel: (isOutputChosen ? output?.label : null) ?? 'the system’s output',
        rateHz: settings.sampleRate ?? context.sampleRate,
        channelCount: settings.channelCount ?? 2,
        processing: Object.entries(PROCESSING).flatMap(([key, name]) =>
          settings[key as keyof typeof PROCESSING] === true ? [name] : [],
        ),
        isOutputChosen,
      },
    };
  } catch (reason) {
    track.stop();
    throw reason;
  }
}

/**
 * Watches that an input and an output stay plugged in. A system may move a stream to another device without a word to
 * the track or the context, so that something else would be measured.
 *
 * @param ids - as the browser gives them; empty ones are the system's choice, which isn't watched
 * @returns ends the watch
 */
export function watchDevices(
  { inputId, outputId }: { inputId: string; outputId: string },
  onGone: (which: 'input' | 'output') => void,
): () => void {
  const media = mediaDevices();
  const look = async () => {
    const { inputs, outputs } = await listDevices();
    const isGone = (id: string, among: readonly MediaDeviceInfo[]) =>
      id !== '' && among.every(({ deviceId }) => deviceId !== id);
    if (isGone(inputId, inputs)) onGone('input');
    else if (isGone(outputId, outputs)) onGone('output');
  };
  const onChange = () => void look();
  media.addEventListener('devicechange', onChange);
  // Some systems tell the browser of a device that went only when it asks.
  const timer = setInterval(onChange, LOOK_MS);
  return () => {
    clearInterval(timer);
    media.removeEventListener('devicechange', onChange);
  };
}

/** Some browsers don't say the track's rate, and some refuse another than their own. */
function contextAt(trackRateHz: number | null, askedRateHz: number): AudioContext {
  try {
    return new AudioContext({ sampleRate: trackRateHz ?? askedRateHz, latencyHint: 'playback' });
  } catch (reason) {
    if (!(reason instanceof DOMException && reason.name === 'NotSupportedError')) throw reason;
    return new AudioContext({ latencyHint: 'playback' });
  }
}

/** Web Audio API 1.1; not in every browser, nor in TypeScript's library. */
function canChooseOutput(
  context: AudioContext,
): context is AudioContext & { setSinkId: (id: string) => Promise<void> } {
  return 'setSinkId' in context;
}

/** True when the sound goes where it was asked to. */
async function sendTo(context: AudioContext, outputId: string): Promise<boolean> {
  if (outputId === '') return true;
  if (!canChooseOutput(context)) return false;
  await context.setSinkId(outputId);
  return true;
}
