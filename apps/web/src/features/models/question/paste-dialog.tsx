import { findModel, type Json } from '@nightcone/models';
import { useState } from 'react';
import { Button } from '../../../components/button.tsx';
import { Dialog } from '../../../components/dialog.tsx';
import { FieldError } from '../../../components/field.tsx';
import type { Question } from './fill-form.ts';

export type PastedQuestion = Question & { model: string };

/** Reads a specification, or a sweep `{ specification, axes }`, from pasted JSON; a sentence where it is none. */
export function readPasted(text: string): { ok: true; question: PastedQuestion } | { ok: false; message: string } {
  let value: unknown;
  try {
    value = JSON.parse(text);
  } catch (error) {
    return { ok: false, message: `This is no JSON: ${(error as Error).message}.` };
  }
  const outer = object(value);
  const specification = object(outer?.specification) ?? outer;
  const model = specification?.model;
  if (!specification || typeof model !== 'string') return { ok: false, message: 'There is no “model” in it.' };
  if (!findModel(model)) return { ok: false, message: `There is no model “${model}” here.` };
  const axes = Array.isArray(outer?.axes) ? (outer.axes as Question['axes']) : undefined;
  return {
    ok: true,
    question: {
      model,
      parameters: (object(specification.parameters) ?? {}) as { [name: string]: Json },
      numerics: (object(specification.numerics) ?? {}) as { [name: string]: Json },
      ...(axes ? { axes } : {}),
    },
  };
}

const object = (value: unknown): Record<string, unknown> | undefined =>
  typeof value === 'object' && value !== null && !Array.isArray(value) ? (value as Record<string, unknown>) : undefined;

export function PasteDialog({
  open,
  onOpenChange,
  onQuestion,
}: {
  open: boolean;
  onOpenChange: (open: boolean) => void;
  onQuestion: (question: PastedQuestion) => void;
}) {
  const [text, setText] = useState('');
  const [error, setError] = useState<string | null>(null);
  const fill = () => {
    const read = readPasted(text);
    if (!read.ok) {
      setError(read.message);
      return;
    }
    setError(null);
    setText('');
    onOpenChange(false);
    onQuestion(read.question);
  };
  return (
    <Dialog
      open={open}
      onOpenChange={onOpenChange}
      title="Paste a specification"
      description="The JSON of a job or of a sweep, as the command line or a job page gives it. It fills the form; its program is left out."
    >
      <textarea
        aria-label="Specification as JSON"
        aria-invalid={error ? true : undefined}
        value={text}
        onChange={(event) => setText(event.target.value)}
        rows={10}
        spellCheck={false}
        className="num w-full border-rule border-b bg-field p-2"
      />
      {error ? <FieldError>{error}</FieldError> : null}
      <div className="mt-3">
        <Button look="main" onClick={fill} disabled={text.trim() === ''}>
          Fill the form
        </Button>
      </div>
    </Dialog>
  );
}
