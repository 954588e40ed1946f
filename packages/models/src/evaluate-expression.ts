import type { Expression, SpecificationBody } from './expression.ts';
import { pathExists, typeAt } from './field-at.ts';
import type { Field, FieldType, Json } from './fields.ts';
import { getTokens, pointerTokens } from './pointer.ts';

/** The fields by which an expression reads a specification. */
export interface ModelFields {
  parameters: Field[];
  numerics: Field[];
}
type Evaluate = (body: SpecificationBody) => number;

/**
 * Makes a function of an expression tree (expression.ts), to be called for every point of a sweep. Throws on a pointer
 * that the model cannot have. Only IEEE + − × ÷ √ and comparisons: the same number in browser and server.
 */
export function compileExpression(expression: Expression, model: ModelFields): Evaluate {
  if (typeof expression === 'number') return () => expression;
  if ('read' in expression) return compileRead(expression.read, model);
  if ('is' in expression) return compileIs(expression.is, expression.kind, model);
  const args = expression.args.map((argument) => compileExpression(argument, model));
  const operate = operations[expression.op];
  return (body) => {
    const values = args.map((argument) => argument(body));
    return operate(values);
  };
}

/** Value of an expression for one complete specification. */
export function evaluateExpression(expression: Expression, model: ModelFields, body: SpecificationBody): number {
  return compileExpression(expression, model)(body);
}

const fold = (step: (a: number, b: number) => number) => (values: number[]) => values.reduce(step);
/** Several arguments are taken from left to right; `-` with one argument is the negative. */
const operations: Record<Extract<Expression, { op: string }>['op'], (values: number[]) => number> = {
  '+': fold((a, b) => a + b),
  '-': (values) => (values.length === 1 ? -(values[0] ?? 0) : values.reduce((a, b) => a - b)),
  '*': fold((a, b) => a * b),
  '/': fold((a, b) => a / b),
  sqrt: ([value]) => Math.sqrt(value ?? 0),
  min: fold((a, b) => Math.min(a, b)),
  max: fold((a, b) => Math.max(a, b)),
  floor: ([value]) => Math.floor(value ?? 0),
};

function compileRead(pointer: string, model: ModelFields): Evaluate {
  const tokens = knownTokens(pointer, model);
  return (body) => {
    const type = typeIn(body, tokens, model);
    return type === undefined ? 0 : readNumber(type, getTokens(body, tokens), pointer);
  };
}

function compileIs(pointer: string, kind: string, model: ModelFields): Evaluate {
  const tokens = knownTokens(pointer, model);
  return (body) => (typeIn(body, tokens, model) && kindOf(getTokens(body, tokens)) === kind ? 1 : 0);
}

function knownTokens(pointer: string, model: ModelFields): string[] {
  const tokens = pointerTokens(pointer);
  const [part, ...path] = tokens;
  const fields = part === 'parameters' ? model.parameters : part === 'numerics' ? model.numerics : [];
  if (!pathExists(fields, path)) throw new RangeError(`the model has nothing at ${pointer}`);
  return tokens;
}

function typeIn(body: SpecificationBody, [part, ...path]: string[], model: ModelFields): FieldType | undefined {
  return part === 'numerics'
    ? typeAt(model.numerics, body.numerics, path)
    : typeAt(model.parameters, body.parameters, path);
}

function kindOf(value: Json | undefined): Json | undefined {
  if (typeof value === 'number') return 'number';
  return typeof value === 'object' && value !== null && !Array.isArray(value) ? value.kind : value;
}

function readNumber(type: FieldType, value: Json | undefined, pointer: string): number {
  switch (type.type) {
    case 'axis':
      return axisCount(value);
    case 'list':
      return Array.isArray(value) ? value.length : 0;
    case 'boolean':
      return value === true ? 1 : 0;
    case 'number':
    case 'integer':
    case 'auto-number':
      return typeof value === 'number' ? value : 0;
    default:
      throw new RangeError(`${pointer} is a ${type.type} and has no number; ask for its kind with "is"`);
  }
}

/** Number of points of an axis value. */
export function axisCount(value: Json | undefined): number {
  if (typeof value !== 'object' || value === null || Array.isArray(value)) return 1;
  if (Array.isArray(value.values)) return value.values.length;
  return typeof value.count === 'number' ? value.count : 0;
}
