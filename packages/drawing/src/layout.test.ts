import { inflateSync } from 'node:zlib';
import { expect, test } from 'vitest';
import { layoutPlot } from './layout.ts';
import { linePath } from './path.ts';
import type { Plot } from './plot.ts';
import { base64, encodePng } from './png.ts';
import { plotToSvg } from './svg.ts';

const plot: Plot = {
  caption: 'Levels & a <test>',
  x: { symbol: 'k', unit: '1/nm', domain: [-1, 1] },
  y: { symbol: 'E', unit: 'eV', domain: [-0.25, 0.25] },
  marks: [
    { kind: 'line', role: 'K', x: [-1, 0, 1], y: [-0.2, 0, 0.2] },
    { kind: 'points', role: 'ink', x: [0, 5], y: [0.1, 0.1] },
    { kind: 'rule', role: 'marker', across: 'x', at: 0.5, label: 'edge', dotted: true },
  ],
  side: { title: 'n', labels: Array.from({ length: 41 }, (_, i) => ({ at: (i - 20) * 0.012, text: String(i - 20) })) },
};

test('energies are shown in meV and the spines stand 8 px off the data', () => {
  const geometry = layoutPlot(plot, { width: 500, height: 400 });
  expect(geometry.y.unit).toBe('meV');
  expect(geometry.data.x - geometry.y.at).toBe(8);
  expect(geometry.x.at - geometry.data.y - geometry.data.height).toBe(8);
  expect(geometry.fromX(geometry.toX(0.3))).toBeCloseTo(0.3, 12);
});

test('points outside the window are left out, crowded labels thinned with zero kept', () => {
  const geometry = layoutPlot(plot, { width: 500, height: 400 });
  expect(geometry.points[0]?.places).toHaveLength(2);
  const labels = geometry.side?.labels ?? [];
  expect(labels.map((label) => label.text)).toContain('0');
  for (let i = 1; i < labels.length; i++)
    expect((labels[i]?.at ?? 0) - (labels[i - 1]?.at ?? 0)).toBeGreaterThanOrEqual(13);
});

test('a NaN breaks a line; slopes make it a cubic through the same ends', () => {
  const id = (v: number) => v;
  expect(linePath({ kind: 'line', role: 'ink', x: [0, 1, 2, 3, 4], y: [0, 1, Number.NaN, 3, 4] }, id, id)).toBe(
    'M0,0L1,1M3,3L4,4',
  );
  expect(linePath({ kind: 'line', role: 'ink', x: [0, 3], y: [0, 3], slopes: [1, 1] }, id, id)).toBe(
    'M0,0C1,1,2,2,3,3',
  );
});

test('the same plot gives the same bytes, escaped, with no more than two decimals', () => {
  const svg = plotToSvg(plot, { width: 500, height: 400 }, { metadata: { job: 'a1' } });
  expect(svg).toBe(plotToSvg(structuredClone(plot), { width: 500, height: 400 }, { metadata: { job: 'a1' } }));
  expect(svg).toContain('<title>Levels &amp; a &lt;test&gt;</title>');
  expect(svg).toContain('job: a1');
  expect(svg).not.toMatch(/\d\.\d{3,}/);
  expect(svg).not.toContain('NaN');
});

test('a palette PNG unpacks to its steps', () => {
  const png = encodePng(Uint8Array.from([0, 1, 255, 0]), 2, 2, ['#ff0000', '#00ff00']);
  const text = Buffer.from(png);
  const length = text.readUInt32BE(text.indexOf('IDAT') - 4);
  const start = text.indexOf('IDAT') + 4;
  expect([...inflateSync(text.subarray(start, start + length))]).toEqual([0, 0, 1, 0, 2, 0]);
  expect(base64(png)).toBe(text.toString('base64'));
});
