import { STIMULUS_KINDS } from '../../stimulus/stimulus-kinds.js';
import { partNumber, type AlignedPart } from '../shared/align-stimulus.js';

/** The stimulus that a programme's part is, by its measure and, of pairs, by the tones' ratio. */
export function stimulusNameOf(part: Pick<AlignedPart, 'measure' | 'parameters'>): string {
  const kinds = STIMULUS_KINDS.filter(({ measure }) => measure === part.measure);
  const ratio = partNumber(part, 'amplitudeRatio');
  const isModulation = ratio !== null && ratio > 1;
  const kind = kinds.find(({ name }) => ratio === null || name.startsWith('modulation') === isModulation);
  return kind?.name ?? part.measure;
}

/** What a part is called in a sentence. */
export function partTitle(part: Pick<AlignedPart, 'measure' | 'parameters' | 'channels'>): string {
  return `"${stimulusNameOf(part)}"`;
}
