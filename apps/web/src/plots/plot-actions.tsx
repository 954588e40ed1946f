import { lazy, Suspense, useState } from 'react';
import { TextButton } from '../components/button.tsx';
import { Dialog } from '../components/dialog.tsx';
import { Loading } from '../components/problem-note.tsx';
import { useTheme } from '../lib/theme.ts';
import type { BuiltPlot } from './built-plot.ts';

const ValueTable = lazy(() => import('./value-table.tsx').then((module) => ({ default: module.ValueTable })));

/** Under every plot: the values as a table, and the drawing and its data as files. */
export function PlotActions({
  built,
  name,
  metadata = {},
}: {
  built: BuiltPlot;
  /** File name without its ending. */
  name: string;
  metadata?: Record<string, string>;
}) {
  const [open, setOpen] = useState(false);
  const [failed, setFailed] = useState<string | null>(null);
  const theme = useTheme();
  const run = (work: (files: typeof import('./plot-exports.ts')) => void | Promise<void>) => {
    setFailed(null);
    import('./plot-exports.ts').then(work).catch((error: Error) => setFailed(`Not saved: ${error.message}.`));
  };
  const options = { name, metadata, theme };
  return (
    <span className="flex flex-wrap items-center gap-x-3">
      <TextButton onClick={() => setOpen(true)}>Table of values</TextButton>
      <TextButton onClick={() => run((files) => files.downloadSvg(built, options))}>SVG</TextButton>
      <TextButton onClick={() => run((files) => files.downloadPng(built, options))}>PNG, 300 dpi</TextButton>
      <TextButton onClick={() => run((files) => files.downloadCsv(built, options))}>CSV</TextButton>
      {failed ? <span role="alert">{failed}</span> : null}
      <Dialog open={open} onOpenChange={setOpen} title="Table of values" description={built.plot.caption}>
        <Suspense fallback={<Loading what="the values" />}>
          <ValueTable table={built.table} caption={built.plot.caption} />
        </Suspense>
      </Dialog>
    </span>
  );
}
