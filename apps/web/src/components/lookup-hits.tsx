import { Link } from 'react-router-dom';
import { useApi } from '../lib/query.ts';
import { ShortHash } from './hash-comb.tsx';
import { Loading, ProblemNote } from './problem-note.tsx';

/** On screens a kernel is called a program. */
const kinds: Record<string, string> = { kernel: 'program' };
const wellFormed = /^[0-9a-f]{12,64}$/;

/** What a hash, or its first digits, can be; several hits are listed. */
export function LookupHits({ hash, onFollow }: { hash: string; onFollow?: () => void }) {
  const ready = wellFormed.test(hash);
  const query = useApi('lookupHash', { params: { hash } }, { enabled: ready });
  if (!ready) {
    const stray = hash.replace(/[0-9a-f]/g, '');
    return (
      <p role="status" className="text-ink2">
        {stray
          ? `A hash has only the digits 0–9 and a–f; “${stray[0]}” is not one of them.`
          : hash.length > 64
            ? `A hash has 64 digits; these are ${hash.length}.`
            : `At least twelve digits are needed; ${hash.length} so far.`}
      </p>
    );
  }
  if (query.isError) return <ProblemNote error={query.error} />;
  if (!query.data) return <Loading what="the index of hashes" />;
  if (query.data.hits.length === 0) {
    return <p role="status">Nothing here carries this hash, or it is not open to you.</p>;
  }
  return (
    <ul>
      {query.data.hits.map((hit) => (
        <li key={`${hit.kind} ${hit.hash}`} className="border-hair border-b py-1.5 last:border-b-0">
          <Link to={hit.path} onClick={onFollow} className="group flex flex-wrap items-baseline gap-x-4">
            <span className="w-20 text-ink3 text-small">{kinds[hit.kind] ?? hit.kind}</span>
            <span className="link grow">{hit.title}</span>
            <ShortHash hash={hit.hash} />
          </Link>
        </li>
      ))}
    </ul>
  );
}
