const WORDS_MAX = 8;

/** A LIKE pattern that finds the word anywhere; its own %, _ and \\ stand for themselves. */
export function likePattern(word: string): string {
  return `%${word.replace(/[\\%_]/g, '\\$&')}%`;
}

/** What somebody typed into a search box as patterns, each of which must be found. */
export function searchPatterns(text: string | undefined): string[] {
  const words = (text ?? '').normalize('NFC').toLowerCase().split(/\s+/).filter(Boolean);
  return words.slice(0, WORDS_MAX).map(likePattern);
}

/** Joins what can be searched for into one lower-case text. */
export function searchText(parts: readonly (string | null)[]): string {
  return parts
    .filter((part) => part !== null && part !== '')
    .join(' ')
    .normalize('NFC')
    .toLowerCase();
}
