import type { ModelDefinition } from '@nightcone/models';
import { createContext, useContext } from 'react';
import type { UseFormRegister } from 'react-hook-form';
import type { CheckedForm } from './check-form.ts';
import type { FormTexts } from './form-texts.ts';

export interface QuestionNote {
  key: string;
  letter: string;
  severity: 'note' | 'caution' | 'refuse';
  text: string;
  /** Name of the control it stands beside. */
  control: string;
}

export interface QuestionForm {
  model: ModelDefinition;
  register: UseFormRegister<FormTexts>;
  setText(name: string, text: string): void;
  texts: FormTexts;
  checked: CheckedForm;
  /** What is wrong, by the name of the control. */
  problems: ReadonlyMap<string, string>;
  notes: ReadonlyMap<string, readonly QuestionNote[]>;
  /** Place on each axis of the sweep that is previewed. */
  positions: readonly number[];
  setPosition(axis: number, position: number): void;
  showHelp(help: { title: string; help: string } | null): void;
}

const Context = createContext<QuestionForm | null>(null);
export const QuestionProvider = Context.Provider;

export function useQuestionForm(): QuestionForm {
  const form = useContext(Context);
  if (!form) throw new Error('a control stands outside its form');
  return form;
}
