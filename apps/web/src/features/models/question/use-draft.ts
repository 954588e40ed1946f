import { useEffect, useRef, useState } from 'react';
import { api } from '../../../lib/api.ts';
import type { FormTexts } from './form-texts.ts';

export interface DraftState {
  /** When the newest texts were kept in this browser, and on the server. */
  hereAt: number | null;
  serverAt: number | null;
  /** The server did not take the last draft. */
  refused: boolean;
}

const key = (model: string) => `nightcone.question.${model}`;

interface KeptDraft {
  texts: FormTexts;
  /** What stood behind the question mark of the address where it was typed. */
  source: string;
  /** Id of the draft on the server. */
  id?: string;
}

export function readDraft(model: string): KeptDraft | null {
  try {
    const kept: unknown = JSON.parse(localStorage.getItem(key(model)) ?? 'null');
    return typeof kept === 'object' && kept !== null && 'texts' in kept ? (kept as KeptDraft) : null;
  } catch {
    return null;
  }
}

function writeDraft(model: string, draft: KeptDraft | null): boolean {
  try {
    if (draft) localStorage.setItem(key(model), JSON.stringify(draft));
    else localStorage.removeItem(key(model));
    return true;
  } catch {
    return false;
  }
}

/** Forgets a draft once its question was submitted: here and on the server. */
export async function dropDraft(model: string): Promise<void> {
  const kept = readDraft(model);
  writeDraft(model, null);
  if (kept?.id) await api.call('deleteDraft', { params: { id: kept.id } }).catch(() => undefined);
}

const serverAfterMs = 4000;

/**
 * Keeps what is typed: in this browser at once, on the server a few seconds after the last keystroke. `untouched`
 * texts (the defaults, an example as it came) are not worth a draft.
 */
export function useDraft(
  model: string,
  title: string,
  texts: FormTexts,
  untouched: boolean,
  source: string,
): DraftState {
  const [state, setState] = useState<DraftState>({ hereAt: null, serverAt: null, refused: false });
  const sent = useRef('');
  useEffect(() => {
    if (untouched) return;
    const id = readDraft(model)?.id;
    if (writeDraft(model, { texts, source, ...(id ? { id } : {}) }))
      setState((last) => ({ ...last, hereAt: Date.now() }));
    const body = JSON.stringify(texts);
    if (body === sent.current) return;
    const timer = setTimeout(() => {
      sent.current = body;
      keepOnServer(model, title, texts, source).then(
        () => setState((last) => ({ ...last, serverAt: Date.now(), refused: false })),
        () => setState((last) => ({ ...last, refused: true })),
      );
    }, serverAfterMs);
    return () => clearTimeout(timer);
  }, [model, title, texts, untouched, source]);
  return state;
}

async function keepOnServer(model: string, title: string, texts: FormTexts, source: string): Promise<void> {
  const body = { title: title.slice(0, 200) || model, model, body: { texts } };
  const known = readDraft(model)?.id;
  if (known) {
    try {
      await api.call('updateDraft', { params: { id: known }, body });
      return;
    } catch {
      // deleted elsewhere: keep a new one
    }
  }
  const draft = await api.call('createDraft', { body });
  writeDraft(model, { texts, source, id: draft.id });
}
