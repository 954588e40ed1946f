import { type ReactNode, useEffect, useState } from 'react';
import { TextButton } from './button.tsx';

/** Copies a text and says so for two seconds, to screen readers too. */
export function CopyButton({ text, children }: { text: string; children: ReactNode }) {
  const { copy, said } = useCopy(text);
  return (
    <TextButton onClick={copy}>
      <span aria-live="polite">{said ?? children}</span>
    </TextButton>
  );
}

export function useCopy(text: string): { copy: () => void; said: string | null } {
  const [said, setSaid] = useState<string | null>(null);
  useEffect(() => {
    if (!said) return;
    const timer = setTimeout(() => setSaid(null), 2000);
    return () => clearTimeout(timer);
  }, [said]);
  const copy = () => {
    navigator.clipboard?.writeText(text).then(
      () => setSaid('Copied'),
      () => setSaid('Not allowed to copy'),
    ) ?? setSaid('Not allowed to copy');
  };
  return { copy, said };
}
