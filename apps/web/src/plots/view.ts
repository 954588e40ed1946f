import type { BuiltPlot } from './built-plot.ts';
import type { ArrayHead, ResultData } from './result-data.ts';

/** One way to look at a result: which arrays it needs (with their companions where there are any) and how it is built. */
export interface View {
  id: string;
  label: string;
  needs: readonly string[];
  optional: readonly string[];
  build(data: ResultData, choice?: number): BuiltPlot;
  /** What can be chosen inside the view, e.g. one of the states asked for. */
  choices?: { label: string; list(data: ResultData): string[] };
}

/** What a view must know of an array before it is loaded. */
export type ViewedArray = Pick<ArrayHead, 'name' | 'shape' | 'dims'> & { ragged?: string | undefined };
