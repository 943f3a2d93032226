import type { InputGrid } from '@benchlark/dsp';
import { formatLevel } from '@/lib/format/quantity';

export interface GridWords {
  /** Stands in the record of a take. */
  readonly short: string;
  /** What it costs; null where it costs nothing. */
  readonly cost: string | null;
}

/** What an input's samples can show, told from the samples. */
export function gridWords({ kind, floorDbfs }: InputGrid): GridWords {
  switch (kind) {
    case '16-bit':
    case '16-bit-asymmetric':
      return {
        short: kind === '16-bit' ? '16 bits' : '16 bits, scaled unevenly and set right',
        cost: `This browser gives 16 bits here: nothing below about ${formatLevel(floorDbfs ?? -98, 'dBFS', 0)} can be seen. Record a file with another program and upload it for more.`,
      };
    case '24-bit':
      return { short: '24 bits', cost: null };
    case 'float':
      return { short: 'floats', cost: null };
    case 'silent':
      return { short: 'silent so far', cost: null };
    case 'unknown':
      return { short: 'not told yet', cost: null };
  }
}
