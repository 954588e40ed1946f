import { type FormEvent, lazy, Suspense, useEffect, useState } from 'react';
import { useNavigate } from 'react-router-dom';
import { cleanHash } from '../lib/format-hash.ts';

const LookupDialog = lazy(() => import('./lookup-dialog.tsx'));

/** The field of the header; Ctrl K or ⌘ K opens the same look-up as a dialog from anywhere. */
export function LookupField() {
  const [text, setText] = useState('');
  const [open, setOpen] = useState(false);
  const navigate = useNavigate();
  useEffect(() => {
    const onKey = (event: KeyboardEvent) => {
      if (event.key.toLowerCase() !== 'k' || !(event.ctrlKey || event.metaKey) || event.altKey) return;
      event.preventDefault();
      setOpen(true);
    };
    addEventListener('keydown', onKey);
    return () => removeEventListener('keydown', onKey);
  }, []);
  const submit = (event: FormEvent) => {
    event.preventDefault();
    const hash = cleanHash(text);
    if (!hash) return;
    setText('');
    void navigate(`/h/${encodeURIComponent(hash)}`);
  };
  return (
    <search className="grow margin:grow-0">
      <form onSubmit={submit} className="flex items-center border-rule border-b bg-field pr-2 focus-within:border-ink">
        <input
          aria-label="Look up any hash"
          placeholder="Look up any hash"
          value={text}
          onChange={(event) => setText(event.target.value)}
          autoComplete="off"
          spellCheck={false}
          className="min-h-[30px] w-full min-w-0 bg-transparent px-2 text-small placeholder:text-ink3 margin:w-44"
        />
        <kbd aria-hidden className="hidden text-ink3 text-least margin:inline">
          Ctrl K
        </kbd>
      </form>
      {open ? (
        <Suspense>
          <LookupDialog open={open} onOpenChange={setOpen} />
        </Suspense>
      ) : null}
    </search>
  );
}
