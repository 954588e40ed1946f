import { type FormEvent, useState } from 'react';
import { useNavigate } from 'react-router-dom';
import { Dialog } from '../components/dialog.tsx';
import { TextField } from '../components/field.tsx';
import { LookupHits } from '../components/lookup-hits.tsx';
import { cleanHash } from '../lib/format-hash.ts';

/** Look-up from anywhere: hits appear as soon as twelve digits stand there. */
export default function LookupDialog({ open, onOpenChange }: { open: boolean; onOpenChange: (open: boolean) => void }) {
  const [text, setText] = useState('');
  const navigate = useNavigate();
  const hash = cleanHash(text);
  const submit = (event: FormEvent) => {
    event.preventDefault();
    if (!hash) return;
    onOpenChange(false);
    void navigate(`/h/${encodeURIComponent(hash)}`);
  };
  return (
    <Dialog
      open={open}
      onOpenChange={onOpenChange}
      title="Look up a hash"
      description="Job, result, program or table: all 64 digits, or the first twelve as they stand under a figure."
    >
      <form onSubmit={submit} className="flex flex-col gap-3">
        <TextField
          label="Hash"
          value={text}
          onChange={(event) => setText(event.target.value)}
          autoComplete="off"
          spellCheck={false}
        />
      </form>
      <div className="mt-3 min-h-16">
        {hash ? <LookupHits hash={hash} onFollow={() => onOpenChange(false)} /> : null}
      </div>
    </Dialog>
  );
}
