import text400 from '@fontsource/atkinson-hyperlegible-next/files/atkinson-hyperlegible-next-latin-400-normal.woff2?url';
import text600 from '@fontsource/atkinson-hyperlegible-next/files/atkinson-hyperlegible-next-latin-600-normal.woff2?url';
import mono400 from '@fontsource/jetbrains-mono/files/jetbrains-mono-latin-400-normal.woff2?url';

const FACES = [
  { family: 'Atkinson Hyperlegible Next', weight: 400, url: text400 },
  { family: 'Atkinson Hyperlegible Next', weight: 600, url: text600 },
  { family: 'JetBrains Mono', weight: 400, url: mono400 },
] as const;

async function toBase64(url: string): Promise<string> {
  const response = await fetch(url);
  if (!response.ok) throw new Error(`The font could not be fetched (${response.status})`);
  const bytes = new Uint8Array(await response.arrayBuffer());
  let binary = '';
  for (const byte of bytes) binary += String.fromCharCode(byte);
  return btoa(binary);
}

let faces: Promise<string> | null = null;

/** @font-face rules with the fonts in them, so that an exported SVG looks the same on any machine. */
export function embeddedFontFaces(): Promise<string> {
  faces ??= Promise.all(
    FACES.map(
      async ({ family, weight, url }) =>
        `@font-face{font-family:'${family}';font-weight:${weight};src:url(data:font/woff2;base64,${await toBase64(url)}) format('woff2')}`,
    ),
  ).then((rules) => rules.join(''));
  // A failed fetch must not be kept: the next export tries again.
  faces.catch(() => {
    faces = null;
  });
  return faces;
}
