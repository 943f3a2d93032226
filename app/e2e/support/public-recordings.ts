import { execFileSync } from 'node:child_process';
import path from 'node:path';

/** Files written by tools that are not ours, so that the reader is not only tested on what its own writer makes. */
export interface PublicRecordings {
  /** WAVE_FORMAT_EXTENSIBLE, 24 bit, written by sox. */
  readonly soxExtensible: string;
  /** RF64, 24 bit, written by ffmpeg. */
  readonly ffmpegRf64: string;
  /** 32-bit float, converted by sndfile-convert. */
  readonly sndfileFloat: string;
  /** A-law: no recording that can be measured. */
  readonly sndfileAlaw: string;
}

function run(command: string, ...args: string[]): void {
  execFileSync(command, args, { stdio: ['ignore', 'ignore', 'inherit'] });
}

/** A tone a channel at half of full scale, six seconds, in each form. */
export function makePublicRecordings(folder: string): PublicRecordings {
  const soxExtensible = path.join(folder, 'sox extensible.wav');
  const ffmpegRf64 = path.join(folder, 'ffmpeg rf64.wav');
  const sndfileFloat = path.join(folder, 'sndfile float.wav');
  const sndfileAlaw = path.join(folder, 'sndfile alaw.wav');
  const tones = ['synth', '6', 'sine', '997', 'sine', '1499', 'vol', '0.5', 'dither'];
  run('sox', '-R', '-n', '-r', '96000', '-b', '24', '-c', '2', soxExtensible, ...tones);
  run('ffmpeg', '-v', 'error', '-y', '-i', soxExtensible, '-c:a', 'pcm_s24le', '-rf64', 'always', ffmpegRf64);
  run('sndfile-convert', '-float32', soxExtensible, sndfileFloat);
  run('sndfile-convert', '-alaw', soxExtensible, sndfileAlaw);
  return { soxExtensible, ffmpegRf64, sndfileFloat, sndfileAlaw };
}
