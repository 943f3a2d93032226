import { searchPatterns, searchText } from './search-words';

describe('searchPatterns', () => {
  it('makes one pattern a word, in lower case', () => {
    expect(searchPatterns('  Hum  LEFT ')).toEqual(['%hum%', '%left%']);
  });

  it('takes the signs that LIKE knows for themselves', () => {
    expect(searchPatterns('100% a_b c\\d')).toEqual(['%100\\%%', '%a\\_b%', '%c\\\\d%']);
  });

  it('finds what searchText wrote, composed and decomposed alike', () => {
    expect(searchPatterns('U\u0308bung')).toEqual([`%${searchText(['\u00dcbung'])}%`]);
  });

  it('asks for nothing when nothing was typed', () => {
    expect(searchPatterns(undefined)).toEqual([]);
    expect(searchPatterns('   ')).toEqual([]);
  });
});
