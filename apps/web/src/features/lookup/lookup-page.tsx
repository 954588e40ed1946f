import { useParams } from 'react-router-dom';
import { HashMark } from '../../components/hash-comb.tsx';
import { LookupHits } from '../../components/lookup-hits.tsx';
import { Page } from '../../components/page.tsx';
import { cleanHash } from '../../lib/format-hash.ts';

/** Resolves any hash and says what it is. */
export function Component() {
  const hash = cleanHash(useParams().hash ?? '');
  const whole = /^[0-9a-f]{64}$/.test(hash);
  return (
    <Page
      wide
      title="Look up a hash"
      lead={whole ? <HashMark hash={hash} what="hash" radius={25} /> : <code>{hash}</code>}
    >
      <div className="mt-5 max-w-[80ch]">
        <LookupHits hash={hash} />
      </div>
    </Page>
  );
}
