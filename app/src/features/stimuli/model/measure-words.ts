import { measures } from '@benchlark/dsp';

/** What a measure is called on a page. */
export function measureWords(id: string): string {
  return measures.find((measure) => measure.id === id)?.title ?? id;
}
