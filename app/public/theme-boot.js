// Runs before the first paint so that no wrong theme flashes; src/lib/theme.ts keeps the same key.
function readChoice() {
  try {
    return globalThis.localStorage.getItem('benchlark.theme');
  } catch {
    return null; // storage may be forbidden: then the system decides
  }
}

const choice = readChoice();
const isDark =
  choice === 'dark' || (choice !== 'light' && globalThis.matchMedia('(prefers-color-scheme: dark)').matches);
globalThis.document.documentElement.classList.add(isDark ? 'dark' : 'light');
