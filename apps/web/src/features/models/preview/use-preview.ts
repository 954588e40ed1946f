import type { ModelDefinition, Specification } from '@nightcone/models';
import { useEffect, useRef, useState } from 'react';
import { addressOf } from '../../../lib/api.ts';
import { type ResultData, toDataArray } from '../../../plots/result-data.ts';
import type { RunAnswer } from './messages.ts';
import { makeKernelWorker, PreviewRunner } from './preview-runner.ts';
import { reduceSpecification } from './reduce-specification.ts';

export interface PreviewResult {
  data: ResultData;
  heads: { name: string; shape: number[]; dims: string[]; ragged?: string }[];
  /** What was left out: '61 of 401 k'. */
  stated: string[];
  /** Time the kernel took. */
  ms: number;
}

export interface Preview {
  result: PreviewResult | null;
  /** The kernel works on a newer question than the one drawn. */
  busy: boolean;
  /** Why there is no drawing of this question. */
  message: string | null;
}

/** The kernel's answer to a reduced copy of the question, in a worker; the newest question wins. */
export function usePreview(
  model: ModelDefinition,
  kernel: string | null,
  specification: Specification | null,
): Preview {
  const [preview, setPreview] = useState<Preview>({ result: null, busy: false, message: null });
  const runner = useRef<PreviewRunner | null>(null);
  const asked = useRef<{ body: ResultData['body']; stated: string[] } | null>(null);

  useEffect(() => {
    const made = new PreviewRunner(makeKernelWorker, (answer) =>
      setPreview((last) => next(last, answer, asked.current)),
    );
    runner.current = made;
    return () => made.stop();
  }, []);

  useEffect(() => {
    if (!specification || !kernel) return;
    const { body, stated } = reduceSpecification(model, specification);
    asked.current = { body: { ...body, model: model.id }, stated };
    setPreview((last) => ({ ...last, busy: true }));
    runner.current?.run({
      digest: kernel,
      moduleUrl: addressOf('getKernelModule', { params: { digest: kernel } }),
      specification: { ...body, model: model.id },
    });
  }, [model, kernel, specification]);

  return preview;
}

function next(last: Preview, answer: RunAnswer, asked: { body: ResultData['body']; stated: string[] } | null): Preview {
  if (answer.type === 'done' && asked) {
    const arrays = answer.arrays.map((array) => toDataArray(array, array.bytes));
    return {
      busy: false,
      message: null,
      result: {
        data: { body: asked.body, arrays: new Map(arrays.map((array) => [array.name, array])) },
        heads: arrays,
        stated: asked.stated,
        ms: answer.ms,
      },
    };
  }
  if (answer.type === 'refused') return { result: null, busy: false, message: answer.message };
  if (answer.type === 'failed') return { ...last, busy: false, message: `No preview: ${answer.message}.` };
  return last;
}
