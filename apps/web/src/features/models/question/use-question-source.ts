import type { JobView, Sweep } from '@nightcone/contracts';
import type { ModelDefinition } from '@nightcone/models';
import { useMemo } from 'react';
import { useSearchParams } from 'react-router-dom';
import { shortHash } from '../../../lib/format-hash.ts';
import { useApi } from '../../../lib/query.ts';
import type { Body } from '../../../plots/result-data.ts';
import { fillForm, questionOfExample } from './fill-form.ts';
import type { FormTexts } from './form-texts.ts';
import type { PastedQuestion } from './paste-dialog.tsx';
import { readDraft } from './use-draft.ts';

export interface QuestionSource {
  /** Texts the form starts with; null while they are being read. */
  texts: FormTexts | null;
  /** 'Started from worked example 2.' */
  said: string;
  /** Came as it is and was not typed here: not worth a draft yet. */
  untouched: boolean;
  /** The texts are a draft of this browser: one may start afresh. */
  kept?: boolean;
  problem: string | null;
}

/** Where a form's first texts come from: an example, another job or sweep, a server's draft, this browser's draft, the defaults. */
export function useQuestionSource(
  model: ModelDefinition,
  pasted: PastedQuestion | null,
  afresh: number,
): QuestionSource {
  const [search] = useSearchParams();
  const exampleId = search.get('example');
  const from = search.get('from');
  const sweepId = search.get('sweep');
  const draftId = search.get('draft');
  const job = useApi('getJob', { params: { hash: from ?? '' } }, { enabled: from !== null });
  const sweep = useApi('getSweep', { params: { id: sweepId ?? '' } }, { enabled: sweepId !== null });
  const draft = useApi('getDraft', { params: { id: draftId ?? '' } }, { enabled: draftId !== null });
  const place = search.toString();
  // biome-ignore lint/correctness/useExhaustiveDependencies: `afresh` counts how often the draft was dropped
  return useMemo(() => {
    // what was typed on this very address comes back before what the address stands for
    const kept = readDraft(model.id);
    if (kept && !pasted && kept.source === place)
      return {
        texts: { ...fillForm(model, {}), ...kept.texts },
        said: 'Your draft, as you left it.',
        untouched: false,
        kept: true,
        problem: null,
      };
    if (pasted?.model === model.id)
      return { texts: fillForm(model, pasted), said: 'Filled from pasted JSON.', untouched: false, problem: null };
    if (from) return fromJob(model, from, job.data, job.isError ? job.error.message : null);
    if (sweepId) return fromSweep(model, sweep.data, sweep.isError ? sweep.error.message : null);
    if (draftId) return fromDraft(model, draft.data?.body, draft.isError ? draft.error.message : null);
    const example = exampleId ? model.examples.find(({ id }) => id === exampleId) : undefined;
    if (example)
      return {
        texts: fillForm(model, questionOfExample(example)),
        said: `Started from the worked example “${example.title}”.`,
        untouched: true,
        problem: null,
      };
    return {
      texts: fillForm(model, {}),
      said: '',
      untouched: true,
      problem: exampleId ? 'There is no such example.' : null,
    };
  }, [
    model,
    pasted,
    afresh,
    place,
    from,
    job.data,
    job.isError,
    job.error,
    sweepId,
    sweep.data,
    sweep.isError,
    sweep.error,
    draftId,
    draft.data,
    draft.isError,
    draft.error,
    exampleId,
  ]);
}

function fromJob(
  model: ModelDefinition,
  hash: string,
  job: JobView | undefined,
  problem: string | null,
): QuestionSource {
  if (job)
    return {
      texts: fillForm(model, job.specification as unknown as Body),
      said: `Started from job ${shortHash(hash)}.`,
      untouched: true,
      problem: null,
    };
  return problem
    ? { texts: fillForm(model, {}), said: '', untouched: true, problem: `The job could not be read: ${problem}` }
    : { texts: null, said: '', untouched: true, problem: null };
}

function fromSweep(model: ModelDefinition, sweep: Sweep | undefined, problem: string | null): QuestionSource {
  if (sweep)
    return {
      texts: fillForm(model, { ...(sweep.specification as unknown as Body), axes: sweep.axes, title: sweep.title }),
      said: `Started from the sweep “${sweep.title}”.`,
      untouched: true,
      problem: null,
    };
  return problem
    ? { texts: fillForm(model, {}), said: '', untouched: true, problem: `The sweep could not be read: ${problem}` }
    : { texts: null, said: '', untouched: true, problem: null };
}

function fromDraft(model: ModelDefinition, body: unknown, problem: string | null): QuestionSource {
  const texts = (body as { texts?: FormTexts } | undefined)?.texts;
  if (texts)
    return { texts: { ...fillForm(model, {}), ...texts }, said: 'Your draft.', untouched: false, problem: null };
  return problem
    ? { texts: fillForm(model, {}), said: '', untouched: true, problem: `The draft could not be read: ${problem}` }
    : { texts: null, said: '', untouched: true, problem: null };
}
