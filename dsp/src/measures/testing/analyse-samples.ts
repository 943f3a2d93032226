import type { BenchRecord, ChannelResult } from '../../record/record.js';
import type { CaptureFacts } from '../../source/sample-source.js';
import { openMemorySource } from '../../source/open-memory-source.js';
import type { AnalysisContext, AnalysisSettings, Measure } from '../measure.js';

/** Facts of a capture that holds these samples. */
export function factsOf(
  channels: readonly Float64Array[],
  sampleRateHz: number,
  bits: number | 'float',
): CaptureFacts {
  const frameCount = channels[0].length;
  return {
    sha256: '0'.repeat(64),
    sampleRateHz,
    channelCount: channels.length,
    bitsPerSample: bits === 'float' ? 64 : bits,
    sampleFormat: bits === 'float' ? 'float' : 'integer',
    frameCount,
    durationS: frameCount / sampleRateHz,
  };
}

export interface AnalyseOptions extends AnalysisSettings, Partial<Omit<AnalysisContext, 'capture'>> {
  readonly bits?: number | 'float';
}

/** Runs a measure over samples in memory, one array a channel. */
export function analyseSamples(
  measure: Measure,
  channels: readonly Float64Array[],
  sampleRateHz: number,
  { bits = 'float', descriptor, placed, fileWarnings, onProgress, signal, ...settings }: AnalyseOptions = {},
): Promise<BenchRecord> {
  const capture = factsOf(channels, sampleRateHz, bits);
  return measure.analyse(openMemorySource(channels, sampleRateHz), settings, {
    capture,
    descriptor,
    placed,
    fileWarnings,
    onProgress,
    signal,
  });
}

/** A figure that must be a number. */
export function numberOf(channel: ChannelResult, key: string): number {
  const value = channel.figures[key];
  if (typeof value !== 'number') throw new Error(`${key} is ${String(value)}`);
  return value;
}

/** Codes of a record's warnings, each once. */
export function warningCodes(record: BenchRecord): string[] {
  return [...new Set(record.warnings.map(({ code }) => code))];
}
