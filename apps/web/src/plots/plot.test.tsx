import { render, screen } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { expect, test, vi } from 'vitest';
import type { BuiltPlot } from './built-plot.ts';
import { PlotView } from './plot.tsx';
import { tableToCsv } from './plot-exports.ts';

const x = [0, 1, 2, 3, 4];
const y = [0, 1, 0, 1, 0];
const built: BuiltPlot = {
  plot: {
    caption: 'A zigzag of five points.',
    x: { symbol: 'k', unit: '1/nm', domain: [0, 4] },
    y: { symbol: 'E', unit: 'eV', domain: [-1, 2] },
    marks: [{ kind: 'line', role: 'K', x, y }],
  },
  targets: { x, y, describe: (i) => ({ value: `${y[i]} eV`, description: `point ${i}`, rows: [] }) },
  table: {
    columns: [
      { label: 'k', unit: '1/nm' },
      { label: 'name, quoted', unit: '' },
    ],
    rows: 2,
    cell: (row, column) => (column === 0 ? row / 10 : `say "${row}"`),
  },
};

test('the cross-hair is moved by keys and read aloud; Escape ends it', async () => {
  const user = userEvent.setup();
  const heard = vi.fn();
  render(<PlotView built={built} onReadout={heard} />);
  screen.getByRole('application', { name: 'A zigzag of five points.' }).focus();
  await user.keyboard('{ArrowRight}');
  expect(heard).toHaveBeenLastCalledWith(expect.objectContaining({ description: 'point 2' }));
  await user.keyboard('{ArrowRight}');
  expect(screen.getByText('0 eV, point 4')).toBeInTheDocument();
  await user.keyboard('{Escape}');
  expect(heard).toHaveBeenLastCalledWith(null);
});

test('plus zooms, 0 shows all again', async () => {
  const user = userEvent.setup();
  render(<PlotView built={built} />);
  screen.getByRole('application').focus();
  await user.keyboard('+');
  expect(screen.getByRole('button', { name: 'Show all' })).toBeInTheDocument();
  await user.keyboard('0');
  expect(screen.queryByRole('button', { name: 'Show all' })).toBeNull();
});

test('Enter opens what stands behind a point', async () => {
  const user = userEvent.setup();
  const pick = vi.fn();
  render(<PlotView built={built} onPick={pick} />);
  screen.getByRole('application').focus();
  await user.keyboard('{ArrowRight}{Enter}');
  expect(pick).toHaveBeenCalledWith(2);
});

test('CSV carries units and quotes what needs it', () => {
  expect(tableToCsv(built.table)).toBe('k (1/nm),"name, quoted"\r\n0,"say ""0"""\r\n0.1,"say ""1"""\r\n');
});
