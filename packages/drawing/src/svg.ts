import { rasterizeCells } from './cells.ts';
import type { Geometry, LineGeometry, PointsGeometry } from './layout.ts';
import { layoutPlot } from './layout.ts';
import { type Palette, paper, roleStyles } from './palette.ts';
import { round } from './path.ts';
import type { Plot, Size } from './plot.ts';
import { base64, encodePng } from './png.ts';
import { rampColors } from './ramp.ts';
import type { TextRun } from './symbol.ts';

export interface SvgOptions {
  palette?: Palette;
  /** Provenance printed into the file's metadata: hashes, program, caption. */
  metadata?: Record<string, string>;
  /** Physical width in mm; the view box stays in px. */
  widthMm?: number;
  /** Style sheet to embed, e.g. font faces for a renderer that has none of the fonts. */
  style?: string;
}

const serif = "'STIX Two Text',serif";
const sans = "'Atkinson Hyperlegible Next',sans-serif";
const mono = "'JetBrains Mono',monospace";
const escapes: Record<string, string> = { '&': '&amp;', '<': '&lt;', '>': '&gt;', '"': '&quot;' };
export const escapeXml = (text: string) => text.replace(/[&<>"]/g, (c) => escapes[c] as string);

/** The drawing as an SVG document: the same plot, size and palette give the same bytes everywhere. */
export function plotToSvg(plot: Plot, size: Size, options: SvgOptions = {}): string {
  const palette = options.palette ?? paper;
  const geometry = layoutPlot(plot, size);
  const physical = options.widthMm
    ? ` width="${options.widthMm}mm" height="${round((options.widthMm * size.height) / size.width)}mm"`
    : ` width="${size.width}" height="${size.height}"`;
  const { data } = geometry;
  return [
    `<svg xmlns="http://www.w3.org/2000/svg"${physical} viewBox="0 0 ${size.width} ${size.height}" role="img">`,
    `<title>${escapeXml(plot.caption)}</title>`,
    metadata(options.metadata ?? {}),
    ...(options.style ? [`<style>${options.style}</style>`] : []),
    `<defs><clipPath id="data"><rect x="${data.x}" y="${data.y}" width="${data.width}" height="${data.height}"/></clipPath></defs>`,
    `<rect width="${size.width}" height="${size.height}" fill="${palette.ground}"/>`,
    ...geometry.cells.map((cells) => cellsSvg(geometry, cells, palette)),
    ...geometry.rules.map((rule) => {
      const [x1, y1] = rule.from;
      const [x2, y2] = rule.to;
      const dotted = rule.dotted ? ' stroke-dasharray="1 4"' : '';
      const word = rule.label
        ? text(
            x1 + labelShift[rule.anchor],
            y1 + (rule.anchor === 'middle' ? -5 : 6),
            rule.label,
            palette.ink2,
            sans,
            rule.anchor,
          )
        : '';
      return `<path d="M${x1},${y1}L${x2},${y2}" fill="none" stroke="${palette[roleStyles[rule.role].color]}"${dotted}/>${word}`;
    }),
    '<g clip-path="url(#data)" fill="none" stroke-linejoin="round">',
    ...geometry.lines.map((line) => `<path d="${line.path}"${pen(line, palette)}/>`),
    '</g>',
    ...geometry.points.map((points) => pointsSvg(points, palette)),
    axesSvg(geometry, palette),
    '</svg>\n',
  ].join('\n');
}

/** A word stands beside its rule, a mark of failure over it. */
export const labelShift = { start: 5, middle: 0, end: -5 };

const pen = (line: LineGeometry, palette: Palette) => {
  const dash = line.dash ? ` stroke-dasharray="${line.dash}"` : '';
  return ` stroke="${palette[roleStyles[line.role].color]}" stroke-width="${line.width}"${dash}`;
};

const metadata = (entries: Record<string, string>) =>
  Object.keys(entries).length === 0
    ? '<metadata/>'
    : `<metadata>${Object.keys(entries)
        .sort()
        .map((key) => escapeXml(`${key}: ${entries[key]}`))
        .join('\n')}</metadata>`;

function text(x: number, y: number, body: string, fill: string, family: string, anchor = 'start', size = 12) {
  return `<text x="${round(x)}" y="${round(y)}" fill="${fill}" font-family="${family}" font-size="${size}" text-anchor="${anchor}">${escapeXml(body)}</text>`;
}

function runs(x: number, y: number, symbol: TextRun[], unit: string, palette: Palette, anchor: string) {
  const spans = symbol.map((run) => {
    const shift =
      run.shift === 'sub'
        ? ' baseline-shift="sub" font-size="11"'
        : run.shift === 'super'
          ? ' baseline-shift="super" font-size="11"'
          : '';
    return `<tspan${run.italic ? ' font-style="italic"' : ''}${shift}>${escapeXml(run.text)}</tspan>`;
  });
  const rest = unit ? `<tspan font-size="13" fill="${palette.ink2}"> (${escapeXml(unit)})</tspan>` : '';
  return `<text x="${round(x)}" y="${round(y)}" fill="${palette.ink}" font-family="${serif}" font-size="16" text-anchor="${anchor}">${spans.join('')}${rest}</text>`;
}

function axesSvg(geometry: Geometry, palette: Palette): string {
  const { data, x, y, side } = geometry;
  const ticks = [
    `M${data.x},${x.at}H${round(data.x + data.width)}`,
    ...x.ticks.map((tick) => `M${tick.at},${x.at}v${tick.label === null ? 3 : 5}`),
    `M${y.at},${data.y}V${round(data.y + data.height)}`,
    ...y.ticks.map((tick) => `M${y.at},${tick.at}h${tick.label === null ? -3 : -5}`),
  ];
  return [
    `<path d="${ticks.join('')}" fill="none" stroke="${palette.rule}"/>`,
    ...x.ticks.flatMap((tick) =>
      tick.label === null ? [] : [text(tick.at, x.at + 18, tick.label, palette.ink2, mono, 'middle')],
    ),
    ...y.ticks.flatMap((tick) =>
      tick.label === null ? [] : [text(y.at - 8, tick.at + 4, tick.label, palette.ink2, mono, 'end')],
    ),
    runs(y.at, data.y - 14, y.symbol, y.unit, palette, 'middle'),
    runs(data.x + data.width, x.at + 36, x.symbol, x.unit, palette, 'end'),
    ...(side
      ? [
          runs(side.at, data.y - 14, [{ text: side.title, italic: true }], '', palette, 'start'),
          ...side.labels.map((label) => text(side.at, label.at + 4, label.text, palette.ink2, mono)),
        ]
      : []),
  ].join('\n');
}

function cellsSvg(geometry: Geometry, cells: Geometry['cells'][number], palette: Palette): string {
  const colors = rampColors(cells.mark.scale, palette.name);
  const width = Math.max(1, Math.round(cells.box.width * 2));
  const height = Math.max(1, Math.round(cells.box.height * 2));
  const steps = rasterizeCells(cells.mark, geometry.domains.x, geometry.domains.y, width, height);
  const { box, bar } = cells;
  const image = base64(encodePng(steps, width, height, colors));
  const barHeight = bar.height / colors.length;
  return [
    `<image x="${box.x}" y="${box.y}" width="${box.width}" height="${box.height}" preserveAspectRatio="none" image-rendering="pixelated" href="data:image/png;base64,${image}"/>`,
    ...colors.map(
      (color, i) =>
        `<rect x="${bar.x}" y="${round(bar.y + bar.height - (i + 1) * barHeight)}" width="${bar.width}" height="${round(barHeight + 0.3)}" fill="${color}"/>`,
    ),
    ...bar.ticks.map((tick) => text(bar.x + bar.width + 5, tick.at + 4, tick.label, palette.ink2, mono)),
    runs(bar.x + bar.width, bar.y - 14, bar.symbol, bar.unit, palette, 'middle'),
  ].join('\n');
}

/** Path of one mark around (0, 0). */
export function markPath(shape: PointsGeometry['shape'], r: number): string {
  if (shape === 'cross') return `M${-r},${-r}L${r},${r}M${-r},${r}L${r},${-r}`;
  if (shape === 'plus') return `M${-r},0H${r}M0,${-r}V${r}`;
  return `M${-r},0a${r},${r} 0 1,0 ${2 * r},0a${r},${r} 0 1,0 ${-2 * r},0z`;
}

function pointsSvg(points: PointsGeometry, palette: Palette): string {
  const color = palette[roleStyles[points.role].color];
  const shape = markPath(points.shape, points.radius);
  const style =
    points.shape === 'dot'
      ? `fill="${color}"`
      : `fill="${points.shape === 'open' ? palette.ground : 'none'}" stroke="${color}" stroke-width="1.3"`;
  const moves: string[] = [];
  for (let i = 0; i < points.places.length; i += 2)
    moves.push(
      shape.replace(
        /^M([-\d.]+),([-\d.]+)/,
        (_, a, b) =>
          `M${round(Number(a) + (points.places[i] as number))},${round(Number(b) + (points.places[i + 1] as number))}`,
      ),
    );
  if (points.shape === 'dot' || points.shape === 'open') return `<path ${style} d="${moves.join('')}"/>`;
  const uses: string[] = [];
  for (let i = 0; i < points.places.length; i += 2)
    uses.push(
      `<path ${style} transform="translate(${round(points.places[i] as number)} ${round(points.places[i + 1] as number)})" d="${shape}"/>`,
    );
  return uses.join('\n');
}
