import type { Sweep, SweepPoint } from '@nightcone/contracts';
import { useMemo, useState } from 'react';
import { useNavigate } from 'react-router-dom';
import { SelectField, TextField } from '../components/field.tsx';
import { Loading, Note, ProblemNote } from '../components/problem-note.tsx';
import { useApi } from '../lib/query.ts';
import { PlotView } from './plot.tsx';
import { PlotActions } from './plot-actions.tsx';
import type { Body } from './result-data.ts';
import { Segmented } from './segmented.tsx';
import { drawnAxis } from './sweep-axis.ts';
import { rowAt, type SweepQuantity, sweepQuantities } from './sweep-quantities.ts';
import { buildSweepMap, buildSweepSeries } from './sweep-series.ts';

type DrawnSweep = Pick<Sweep, 'id' | 'title' | 'model' | 'axes' | 'specification'>;

/** A quantity of every finished point against what the sweep varies; points appear as they arrive. */
export function SweepPlot({
  sweep,
  points,
  compact = false,
}: {
  sweep: DrawnSweep;
  points: readonly SweepPoint[];
  compact?: boolean;
}) {
  const body = sweep.specification as unknown as Body;
  const quantities = useMemo(() => sweepQuantities(sweep.model, body), [sweep.model, body]);
  const [array, setArray] = useState<string | null>(null);
  const quantity = quantities.find((each) => each.array === array) ?? quantities[0];
  if (!quantity || sweep.axes.length === 0)
    return compact ? null : (
      <Note title="Nothing varies">
        <p>A sweep of one point has no curve; its job has the plot.</p>
      </Note>
    );
  return (
    <SweepDrawing
      key={quantity.array}
      sweep={sweep}
      points={points}
      compact={compact}
      quantity={quantity}
      quantities={quantities}
      onQuantity={setArray}
    />
  );
}

function SweepDrawing({
  sweep,
  points,
  compact,
  quantity,
  quantities,
  onQuantity,
}: {
  sweep: DrawnSweep;
  points: readonly SweepPoint[];
  compact: boolean;
  quantity: SweepQuantity;
  quantities: readonly SweepQuantity[];
  onQuantity: (array: string) => void;
}) {
  const navigate = useNavigate();
  const [places, setPlaces] = useState(() => quantity.dims.map((dim) => dim.first));
  const axes = useMemo(() => sweep.axes.map((axis) => drawnAxis(sweep, axis)), [sweep]);
  const [xAxis, setXAxis] = useState(0);
  const [fixed, setFixed] = useState<(number | null)[]>(() => axes.map((_, i) => (i < 2 ? null : 0)));
  const yAxis = axes.length > 1 ? (xAxis === 0 ? 1 : 0) : null;
  const wide = yAxis !== null && axes.every((axis, i) => i > 1 || axis.places.length >= 5);
  const [form, setForm] = useState<'map' | 'lines'>(wide ? 'map' : 'lines');
  const [entry, setEntry] = useState<number | null>(null);
  const query = useApi('getSweepQuantity', {
    params: { id: sweep.id },
    query: { array: quantity.array, ...(quantity.dims.length > 0 ? { row: rowAt(quantity.dims, places) } : {}) },
  });
  const built = useMemo(() => {
    if (!query.data) return null;
    const rows = new Map(query.data.rows.map((each) => [each.index, each.values]));
    const longest = Math.max(1, ...query.data.rows.map((each) => each.values.length));
    const drawing = {
      entry: Math.min(entry ?? Math.floor(longest / 2), longest - 1),
      axes,
      points,
      quantity: { label: quantity.label, symbol: quantity.symbol, unit: query.data.unit, rows },
      xAxis,
      fixed,
    };
    return form === 'map' && yAxis !== null ? buildSweepMap(drawing, yAxis) : buildSweepSeries(drawing);
  }, [query.data, axes, points, quantity, xAxis, fixed, form, yAxis, entry]);
  const height = compact ? 190 : 420;
  const open = (index: number) => {
    const point = built?.targets.describe(index).point;
    const hash = points.find((each) => each.index === point)?.jobHash;
    if (hash) void navigate(`/jobs/${hash}`);
  };
  return (
    <div>
      {compact ? null : (
        <div className="mb-3 flex flex-wrap items-end gap-x-6 gap-y-3">
          <SelectField label="quantity" value={quantity.array} onChange={(event) => onQuantity(event.target.value)}>
            {quantities.map((each) => (
              <option key={each.array} value={each.array}>
                {each.label}
              </option>
            ))}
          </SelectField>
          {quantity.dims.map((dim, i) =>
            dim.texts.length > 1 ? (
              <SelectField
                key={dim.label}
                label={dim.label}
                value={places[i] ?? dim.first}
                onChange={(event) =>
                  setPlaces(places.map((each, at) => (at === i ? Number(event.target.value) : each)))
                }
              >
                {dim.texts.map((text, place) => (
                  <option key={text} value={place}>
                    {text}
                  </option>
                ))}
              </SelectField>
            ) : null,
          )}
          {form === 'map' && yAxis !== null && quantity.dims.length > 0 ? (
            <TextField
              label="number in the row"
              type="number"
              min={1}
              placeholder="middle"
              value={entry === null ? '' : entry + 1}
              onChange={(event) => {
                const number = Math.round(Number(event.target.value));
                setEntry(number >= 1 ? number - 1 : null);
              }}
            />
          ) : null}
          {axes.length > 1 ? (
            <>
              <SelectField
                label="to the right"
                value={xAxis}
                onChange={(event) => setXAxis(Number(event.target.value))}
              >
                {axes.slice(0, 2).map((axis, i) => (
                  <option key={axis.label} value={i}>
                    {axis.label}
                  </option>
                ))}
              </SelectField>
              <Segmented
                label="drawn as"
                options={[
                  { value: 'map', label: 'map' },
                  { value: 'lines', label: 'lines' },
                ]}
                value={form}
                onChange={setForm}
              />
            </>
          ) : null}
          {axes.slice(2).map((axis, i) => (
            <SelectField
              key={axis.label}
              label={axis.label}
              value={fixed[i + 2] ?? 0}
              onChange={(event) =>
                setFixed(fixed.map((each, place) => (place === i + 2 ? Number(event.target.value) : each)))
              }
            >
              {axis.texts.map((text, place) => (
                <option key={text} value={place}>
                  {text}
                </option>
              ))}
            </SelectField>
          ))}
        </div>
      )}
      {query.isError && !built ? (
        <ProblemNote error={query.error} retry={() => void query.refetch()} />
      ) : built ? (
        <PlotView
          built={built}
          height={height}
          compact={compact}
          onPick={open}
          {...(compact
            ? {}
            : {
                actions: (
                  <PlotActions
                    built={built}
                    name={`sweep-${quantity.array}-${sweep.id.slice(0, 8)}`}
                    metadata={{ sweep: sweep.id, model: sweep.model }}
                  />
                ),
              })}
        />
      ) : (
        <div style={{ minHeight: height }}>
          <Loading what="the values" />
        </div>
      )}
    </div>
  );
}
