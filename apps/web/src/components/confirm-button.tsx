import { useState } from 'react';
import { TextButton } from './button.tsx';

/** An action in words that asks once more, in its own place. */
export function ConfirmButton({
  label,
  what,
  busy,
  onConfirm,
}: {
  /** 'Revoke' */
  label: string;
  /** What it is done to: the second word of the accessible name and of the question. */
  what: string;
  busy: boolean;
  onConfirm: () => void;
}) {
  const [sure, setSure] = useState(false);
  if (!sure) {
    return (
      <TextButton className="justify-self-start" aria-label={`${label} ${what} …`} onClick={() => setSure(true)}>
        {label} …
      </TextButton>
    );
  }
  return (
    <span className="flex flex-wrap gap-x-4">
      <TextButton
        className="font-semibold"
        disabled={busy}
        onClick={() => {
          setSure(false);
          onConfirm();
        }}
      >
        {label} {what}
      </TextButton>
      <TextButton onClick={() => setSure(false)}>Keep</TextButton>
    </span>
  );
}
