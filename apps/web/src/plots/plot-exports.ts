import { night, paper, plotToSvg, withDpi } from '@nightcone/drawing';
import type { Theme } from '../lib/theme.ts';
import type { BuiltPlot, ValueTable } from './built-plot.ts';

/** Size of an exported drawing in px at 96 px per inch; the file itself has no resolution until it is a PNG. */
const exportSize = { width: 640, height: 480 };

export interface ExportOptions {
  /** File name without its ending. */
  name: string;
  /** Hashes and the like, printed into the SVG. */
  metadata: Record<string, string>;
  theme: Theme;
}

export function download(name: string, type: string, body: BlobPart): void {
  const url = URL.createObjectURL(new Blob([body], { type }));
  const link = document.createElement('a');
  link.href = url;
  link.download = name;
  link.click();
  // the click has started the download; the address may go once the browser has taken it
  setTimeout(() => URL.revokeObjectURL(url), 10_000);
}

export function downloadSvg({ plot }: BuiltPlot, { name, metadata, theme }: ExportOptions): void {
  const svg = plotToSvg(plot, exportSize, { palette: theme === 'night' ? night : paper, metadata });
  download(`${name}.svg`, 'image/svg+xml', svg);
}

/** The SVG painted at `dpi`, with the page's own fonts embedded, since an image cannot see the fonts of a page. */
export async function downloadPng({ plot }: BuiltPlot, { name, theme }: ExportOptions, dpi = 300): Promise<void> {
  const { embeddedFonts } = await import('./embedded-fonts.ts');
  const svg = plotToSvg(plot, exportSize, {
    palette: theme === 'night' ? night : paper,
    style: await embeddedFonts(),
  });
  const image = new Image();
  image.src = `data:image/svg+xml;charset=utf-8,${encodeURIComponent(svg)}`;
  await image.decode();
  const canvas = document.createElement('canvas');
  canvas.width = Math.round((exportSize.width * dpi) / 96);
  canvas.height = Math.round((exportSize.height * dpi) / 96);
  canvas.getContext('2d')?.drawImage(image, 0, 0, canvas.width, canvas.height);
  const blob = await new Promise<Blob | null>((done) => canvas.toBlob(done, 'image/png'));
  if (!blob) throw new Error('the browser could not paint the image');
  const png = withDpi(new Uint8Array(await blob.arrayBuffer()), dpi);
  download(`${name}.png`, 'image/png', png as Uint8Array<ArrayBuffer>);
}

/** RFC 4180 with a heading that carries the units; numbers with all digits that tell them apart. */
export function tableToCsv(table: ValueTable): string {
  const quote = (value: number | string) =>
    typeof value === 'number' ? String(value) : /[",\n]/.test(value) ? `"${value.replaceAll('"', '""')}"` : value;
  const lines = [table.columns.map(({ label, unit }) => quote(unit ? `${label} (${unit})` : label)).join(',')];
  for (let row = 0; row < table.rows; row++)
    lines.push(table.columns.map((_, column) => quote(table.cell(row, column))).join(','));
  return `${lines.join('\r\n')}\r\n`;
}

export const downloadCsv = ({ table }: BuiltPlot, { name }: ExportOptions): void =>
  download(`${name}.csv`, 'text/csv;charset=utf-8', tableToCsv(table));
