import sans from '@fontsource-variable/atkinson-hyperlegible-next/files/atkinson-hyperlegible-next-latin-wght-normal.woff2?url';
import mono from '@fontsource-variable/jetbrains-mono/files/jetbrains-mono-latin-wght-normal.woff2?url';
import greekItalic from '@fontsource-variable/stix-two-text/files/stix-two-text-greek-wght-italic.woff2?url';
import italic from '@fontsource-variable/stix-two-text/files/stix-two-text-latin-wght-italic.woff2?url';
import roman from '@fontsource-variable/stix-two-text/files/stix-two-text-latin-wght-normal.woff2?url';
import { base64 } from '@nightcone/drawing';

const faces = [
  { family: 'Atkinson Hyperlegible Next', style: 'normal', url: sans },
  { family: 'JetBrains Mono', style: 'normal', url: mono },
  { family: 'STIX Two Text', style: 'normal', url: roman },
  { family: 'STIX Two Text', style: 'italic', url: italic },
  { family: 'STIX Two Text', style: 'italic', url: greekItalic, range: 'U+0370-03FF' },
];

/** Font faces of the page as data, for drawings that are painted as images. */
export async function embeddedFonts(): Promise<string> {
  const rules = await Promise.all(
    faces.map(async ({ family, style, url, range }) => {
      const bytes = new Uint8Array(await (await fetch(url)).arrayBuffer());
      const limits = range ? `unicode-range:${range};` : '';
      return `@font-face{font-family:'${family}';font-style:${style};font-weight:100 900;${limits}src:url(data:font/woff2;base64,${base64(bytes)}) format('woff2')}`;
    }),
  );
  return rules.join('');
}
