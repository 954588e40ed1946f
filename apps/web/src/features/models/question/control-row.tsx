import type { Field } from '@nightcone/models';
import type { ReactNode } from 'react';
import { FieldError } from '../../../components/field.tsx';
import { SymbolText } from '../../../plots/symbol-text.tsx';
import { type QuestionNote, useQuestionForm } from './question-context.ts';

/** One line of the form: symbol, name with the letters of its notes, control; error and folded notes below. */
export function ControlRow({
  name,
  field,
  htmlFor,
  labelId,
  error,
  errorId,
  inline = false,
  children,
}: {
  name: string;
  field: Field;
  htmlFor?: string;
  labelId?: string;
  error?: string;
  errorId?: string;
  /** Narrow enough to stand beside its name on a phone too. */
  inline?: boolean;
  children: ReactNode;
}) {
  const { notes } = useQuestionForm();
  const own = notes.get(name) ?? [];
  const title = field.display?.title ?? field.name;
  const words = (
    <>
      {title}
      {own.map((note) => (
        <sup key={note.key} aria-hidden="true" className="ml-0.5 hidden margin:inline">
          <i className="symbol font-semibold">{note.letter}</i>
        </sup>
      ))}
    </>
  );
  return (
    <div
      className={`grid gap-x-1 py-1 sm:grid-cols-[2.1rem_7.2rem_minmax(0,1fr)] ${inline ? 'grid-cols-[2.1rem_6.2rem_minmax(0,1fr)] max-[359px]:grid-cols-[2.1rem_minmax(0,1fr)]' : 'grid-cols-[2.1rem_minmax(0,1fr)]'}`}
      title={field.display?.help}
    >
      <span aria-hidden="true" className="pt-[3px]">
        {field.display?.symbol ? <SymbolText tex={field.display.symbol} /> : null}
      </span>
      {htmlFor ? (
        <label htmlFor={htmlFor} className="pt-[3px] leading-[1.3]">
          {words}
        </label>
      ) : (
        <span id={labelId} className="pt-[3px] leading-[1.3]">
          {words}
        </span>
      )}
      <div className={`min-w-0 ${inline ? 'max-[359px]:col-span-2' : 'max-sm:col-span-2'}`}>
        {children}
        {error ? (
          <div className="pt-1.5">
            <FieldError {...(errorId ? { id: errorId } : {})}>{error}</FieldError>
          </div>
        ) : null}
        <FoldedNotes notes={own} />
      </div>
    </div>
  );
}

/** On a narrow screen the margin's entry folds under its line. */
function FoldedNotes({ notes }: { notes: readonly QuestionNote[] }) {
  if (notes.length === 0) return null;
  return (
    <ul className="mt-1 margin:hidden">
      {notes.map((note) => (
        <li key={note.key} className="border-ink border-l pl-2.5 text-small">
          <NoteWords note={note} />
        </li>
      ))}
    </ul>
  );
}

const words = { refuse: 'Refused. ', caution: 'Caution. ', note: '' };

export const NoteWords = ({ note }: { note: QuestionNote }) => (
  <>
    {words[note.severity] ? <b>{words[note.severity]}</b> : null}
    {note.text}
  </>
);
