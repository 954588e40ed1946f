import { operationsPerMs } from '@nightcone/contracts';
import {
  axisCount,
  evaluateExpression,
  getPointer,
  type Json,
  type ModelDefinition,
  type PreviewReduction,
  type SpecificationBody,
  setPointer,
} from '@nightcone/models';

/** A smaller copy of a question for the eye. It is never hashed, and its numbers carry no error. */
export interface ReducedSpecification {
  body: SpecificationBody;
  /** '61 of 401 k', 'one grid of 100 cells'; empty where nothing was left out. */
  stated: string[];
}

/**
 * The first drawing shall stand within 150 ms of the last keystroke. The kernel gets this much of it by the estimate of
 * a reference machine: the browser compiles in between, and other work shares the cores.
 */
const budgetMs = 30;

/** Applies the model's reductions in their order until the estimated cost fits the preview's time. */
export function reduceSpecification(
  model: Pick<ModelDefinition, 'parameters' | 'numerics' | 'cost' | 'preview'>,
  body: SpecificationBody,
  budget = budgetMs * operationsPerMs,
): ReducedSpecification {
  let reduced = body;
  // by place: an axis that is thinned twice is stated once, against what was asked
  const stated = new Map<string, string>();
  for (const reduction of model.preview) {
    if (evaluateExpression(model.cost, model, reduced) <= budget) break;
    const next = reduce(reduced, reduction, body);
    if (!next) continue;
    reduced = next.body;
    stated.set(reduction.pointer, next.stated);
  }
  return { body: reduced, stated: [...stated.values()] };
}

function reduce(
  body: SpecificationBody,
  reduction: PreviewReduction,
  whole: SpecificationBody,
): { body: SpecificationBody; stated: string } | null {
  const document = body as unknown as Json;
  const asked = getPointer(whole as unknown as Json, reduction.pointer);
  const value = getPointer(document, reduction.pointer);
  const put = (next: Json) => setPointer(document, reduction.pointer, next) as unknown as SpecificationBody;
  const name = reduction.pointer.split('/').at(-1) ?? '';
  if ('axisCount' in reduction) {
    const before = axisCount(value);
    const next = value === undefined ? null : thinAxis(value, reduction.axisCount);
    if (!next) return null;
    const after = axisCount(next);
    return {
      body: moveStates(put(next), name, before, after),
      stated: `${after} of ${axisCount(asked)} ${axisWord(name)}`,
    };
  }
  if ('nearestCount' in reduction) {
    if (!isObject(value) || value.kind !== 'nearest' || Number(value.count) <= reduction.nearestCount) return null;
    return {
      body: put({ ...value, count: reduction.nearestCount }),
      stated: `${reduction.nearestCount} of ${value.count} levels`,
    };
  }
  if ('singleGridCells' in reduction) {
    if (!isObject(value) || typeof value.cells !== 'number') return null;
    if (value.kind === 'single' && value.cells <= reduction.singleGridCells) return null;
    const cells = Math.min(value.cells, reduction.singleGridCells);
    return { body: put({ kind: 'single', cells }), stated: `one grid of ${cells} cells` };
  }
  if (typeof value !== 'number' || value <= reduction.integer) return null;
  return { body: put(reduction.integer), stated: `${name} ${reduction.integer} of ${asked}` };
}

/** Fewer points of the same axis: an odd count, both ends and the centre kept. */
export function thinAxis(value: Json, most: number): Json | null {
  const count = axisCount(value);
  const odd = Math.max(3, most % 2 === 0 ? most - 1 : most);
  if (!isObject(value) || count <= odd) return null;
  if (!Array.isArray(value.values)) return { ...value, count: odd };
  const values = value.values;
  return {
    ...value,
    values: Array.from({ length: odd }, (_, i) => values[Math.round((i * (count - 1)) / (odd - 1))] as Json),
  };
}

const axisWords: Record<string, string> = {
  kPerNm: 'k',
  fieldT: 'fields',
  energyEv: 'energies',
  carrierPerNm2: 'densities',
};
const axisWord = (name: string) => axisWords[name] ?? `points of ${name}`;

/** Indices of states on the k axis are moved to the nearest point that is still there. */
function moveStates(body: SpecificationBody, name: string, before: number, after: number): SpecificationBody {
  const states = body.numerics.states;
  if (name !== 'kPerNm' || !Array.isArray(states) || before < 2) return body;
  const moved = new Set(states.map((index) => Math.round((Number(index) * (after - 1)) / (before - 1))));
  return { ...body, numerics: { ...body.numerics, states: [...moved].sort((a, b) => a - b) } };
}

const isObject = (value: Json | undefined): value is { [key: string]: Json } =>
  typeof value === 'object' && value !== null && !Array.isArray(value);
