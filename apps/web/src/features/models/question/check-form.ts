import type { SweepAxisInput } from '@nightcone/contracts';
import { limits } from '@nightcone/contracts';
import {
  type KernelManifest,
  manifestOf,
  models,
  parseSpecification,
  planSweep,
  type Specification,
  type SweepPlan,
} from '@nightcone/models';
import { type FormModel, type FormTexts, kindName, memberName, type Part } from './form-texts.ts';
import { type ReadForm, type ReadProblem, readAxes, readForm } from './read-form.ts';

/** The definitions themselves: the form is made from them and asks questions of the current kernel only. */
const manifest: KernelManifest = manifestOf(models, 'current');
const noKernel = '0'.repeat(64);

export interface CheckedForm extends ReadForm {
  axes: SweepAxisInput[];
  /** Complete, at the first point of a sweep; null while something is wrong. */
  specification: Specification | null;
  /** Points of the sweep; null while something is wrong. */
  plan: SweepPlan | null;
}

/** Reads the texts, completes the specification by the model's schema and looks at the ends of every sweep axis. */
export function checkForm(model: FormModel, texts: FormTexts, kernel: string | null): CheckedForm {
  const read = readForm(model, texts);
  const axes = readAxes(read.swept, texts);
  const problems: ReadProblem[] = [...read.problems];
  const named = new Set(problems.map(({ name }) => name));
  const parsed = parseSpecification(manifest, {
    model: model.id,
    parameters: read.parameters,
    numerics: read.numerics,
    kernel: kernel ?? noKernel,
  });
  if (!parsed.ok)
    for (const problem of parsed.problems) {
      const name = controlOf(model, texts, problem.field);
      if (!named.has(name)) problems.push({ name, message: sentence(problem.message) });
      named.add(name);
    }
  for (const control of read.swept) {
    const { field, values, name } = control;
    if (field.type !== 'number' && field.type !== 'integer') continue;
    const bad = values.find(
      (value) =>
        value < field.min || value > field.max || (field.type === 'number' && field.exclusiveMin && value <= field.min),
    );
    if (bad !== undefined && !named.has(name))
      problems.push({ name, message: `${bad} is outside ${field.min} to ${field.max}.` });
  }
  const count = axes.reduce((product, axis) => product * (axis.range?.count ?? axis.values?.length ?? 1), 1);
  if (count > limits.sweepPoints && read.swept[0])
    problems.push({
      name: read.swept[0].name,
      message: `This sweep has ${count} points; at most ${limits.sweepPoints} are allowed.`,
    });
  const specification = problems.length === 0 && parsed.ok ? parsed.specification : null;
  return { ...read, problems, axes, specification, plan: specification && planOf(specification, read, axes) };
}

/** The plan over values as numbers: ranges are already exact in the controls that made them. */
function planOf(specification: Specification, read: ReadForm, axes: readonly SweepAxisInput[]): SweepPlan | null {
  try {
    return planSweep(
      manifest,
      specification,
      axes.map((axis) => ({
        pointers: axis.pointers,
        values:
          axis.values ??
          (read.swept.find(({ pointer }) => pointer === axis.pointers[0])?.values ?? []).map((value) => [value]),
      })),
    );
  } catch {
    return null;
  }
}

/** The control stands beside the sentence, so its internal name is left out: `fieldT is 5000; …` → `It is 5000; …`. */
const sentence = (message: string) => message.replace(/^\w+ (?=is |has )/, 'It ');

/** Name of the control at a JSON Pointer of the specification, following the chosen kinds. */
export function controlOf(model: FormModel, texts: FormTexts, pointer: string): string {
  const [part, first, ...rest] = pointer.split('/').slice(1);
  const fields = model[part as Part] ?? [];
  let field = fields.find((each) => each.name === first);
  let name = `${part}/${first}`;
  for (const token of rest) {
    if (field?.type === 'choice') {
      const kind = texts[kindName(name)] ?? '';
      if (token === 'kind') return name;
      name = memberName(name, kind, token);
      field = field.kinds.find((each) => each.kind === kind)?.members.find((each) => each.name === token);
    } else if (field?.type === 'group') {
      name = `${name}/${token}`;
      field = field.members.find((each) => each.name === token);
    } else break;
  }
  return name;
}
