import { operationsPerMs } from '@nightcone/contracts';
import {
  compileExpression,
  type Expression,
  getTokens,
  type Json,
  type ModelManifest,
  pointerTokens,
  type SpecificationBody,
} from '@nightcone/models';

export interface JobSizes {
  estimatedMs: number;
  slices: number;
  resultBytes: number;
  memoryBytes: number;
}

/**
 * Cost and sizes of a job by the formulas of the kernel's manifest. Most sweeps vary what no formula reads: sizes of the
 * point before are taken again while everything that the formulas read is the same.
 */
export function compileSizes(model: ModelManifest): (body: SpecificationBody) => JobSizes {
  const { cost, assembleCost, sliceCount, sliceBytes, assembleBytes, resultBytes } = model;
  const formula = (expression: Expression) => compileExpression(expression, model);
  const operations = formula({ op: '+', args: [cost, assembleCost] });
  const memory = formula({ op: 'max', args: [sliceBytes, assembleBytes] });
  const [slices, bytes] = [formula(sliceCount), formula(resultBytes)];
  const all = [cost, assembleCost, sliceCount, sliceBytes, assembleBytes, resultBytes];
  const inputs = [...new Set(all.flatMap(readPointers))].map(pointerTokens);

  let before: (Json | undefined)[] = [];
  let sizes: JobSizes | undefined;
  return (body) => {
    const values = inputs.map((tokens) => asRead(getTokens(body, tokens)));
    if (sizes && values.every((value, i) => Object.is(value, before[i]))) return sizes;
    before = values;
    sizes = {
      estimatedMs: operations(body) / operationsPerMs,
      slices: slices(body),
      resultBytes: Math.ceil(bytes(body)),
      memoryBytes: Math.ceil(memory(body)),
    };
    return sizes;
  };
}

/** Of a choice or an axis a formula sees its kind and members by pointers of their own; `is` asks for the kind. */
const asRead = (value: Json | undefined): Json | undefined =>
  typeof value === 'object' && value !== null && !Array.isArray(value) && value.count === undefined && !value.values
    ? value.kind
    : value;

function readPointers(expression: Expression): string[] {
  if (typeof expression === 'number') return [];
  if ('read' in expression) return [expression.read];
  if ('is' in expression) return [expression.is];
  return expression.args.flatMap(readPointers);
}
