import { formatCount, plural } from '../lib/format-quantity.ts';
import { TextButton } from './button.tsx';

/** Cursor pages: forward, and back to the first. */
export function Pager({
  shown,
  total,
  word,
  many = `${word}s`,
  first,
  next,
  go,
}: {
  shown: number;
  total: number;
  word: string;
  many?: string;
  /** Is this the first page? */
  first: boolean;
  next: string | null;
  go: (cursor: string | undefined) => void;
}) {
  return (
    <nav
      aria-label="Pages of the table"
      className="mt-3 flex flex-wrap items-center gap-x-6 gap-y-2 text-ink2 text-small"
    >
      <span>
        {first && next === null ? plural(total, word, many) : `${formatCount(shown)} of ${plural(total, word, many)}`}
      </span>
      {first ? null : <TextButton onClick={() => go(undefined)}>First page</TextButton>}
      {next ? <TextButton onClick={() => go(next)}>Next page</TextButton> : null}
    </nav>
  );
}
