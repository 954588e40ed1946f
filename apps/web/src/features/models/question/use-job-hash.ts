import type { Specification } from '@nightcone/models';
import { canonicalText, jobHash } from '@nightcone/provenance';
import { useEffect, useState } from 'react';

/** Hash and canonical text of a specification; null while it is being made, or while it does not exist. */
export function useJobHash(specification: Specification | null): { hash: string | null; text: string | null } {
  const [made, setMade] = useState<{ of: Specification; hash: string } | null>(null);
  useEffect(() => {
    if (!specification) return;
    let current = true;
    jobHash(specification).then(
      (hash) => {
        if (current) setMade({ of: specification, hash });
      },
      () => undefined,
    );
    return () => {
      current = false;
    };
  }, [specification]);
  return {
    hash: made && made.of === specification ? made.hash : null,
    text: specification ? canonicalText(specification) : null,
  };
}
