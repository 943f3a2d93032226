import { COMMON_PASSWORDS } from './common-passwords';
import { findPasswordFault } from './password-rules';

// The lengths and the refusal of common and context words: OWASP ASVS 5.0.0, 6.2.1 to 6.2.12.
describe('findPasswordFault', () => {
  const person = {
    email: 'ada.quill@example.org',
    displayName: 'Ada Quill',
    benchName: 'Harbour Lane bench',
  };

  it.each([
    ['eight characters', 'tq7vxm2k'],
    ['64 characters', 'vine '.repeat(12) + 'lamp'],
    ['128 characters', 'k7'.repeat(64)],
    ['128 characters of two units each', '🦊🌊'.repeat(64)],
    ['spaces and other scripts', 'чайник на окне'],
    ['a long sentence with a name in it', 'Ada carries seven lanterns uphill'],
  ])('accepts %s', (_, password) => {
    expect(findPasswordFault(password, person)).toBeUndefined();
  });

  it.each([
    ['seven characters', 'tq7vxm2', 'at least 8'],
    ['seven emoji, though they are fourteen units', '🦊🌊🦊🌊🦊🌊🦊', 'at least 8'],
    ['129 characters', 'k'.repeat(129), 'at most 128'],
    ['a million characters', 'kq'.repeat(500_000), 'at most 128'],
    ['a common one', 'password123', 'tried first'],
    ['a common one in capitals', 'PassWord', 'tried first'],
    ['a common word with a year', 'sunshine1987!', 'tried first'],
    ['one character repeated', 'wwwwwwwwww', 'tried first'],
    ['a run upwards', 'cdefghijkl', 'tried first'],
    ['a run downwards', '98765432', 'tried first'],
    ['the product and a year', 'benchlark2026', 'name or address'],
    ['the own address', 'ada.quill@example.org', 'name or address'],
    ['the own name and a number', 'AdaQuill77', 'name or address'],
    ['the bench’s name', 'harbourlane!1', 'name or address'],
  ])('refuses %s', (_, password, reason) => {
    expect(findPasswordFault(password, person)).toContain(reason);
  });

  it('knows some hundreds of common passwords', () => {
    expect(COMMON_PASSWORDS.size).toBeGreaterThan(400);
  });
});
