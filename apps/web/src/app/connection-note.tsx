import { useEffect, useState } from 'react';
import { useConnected } from '../lib/live-data.ts';

/** A short break is nobody's business; after this long the page says that it may be old. */
const graceMs = 2500;

export function ConnectionNote() {
  const connected = useConnected();
  const [late, setLate] = useState(false);
  useEffect(() => {
    if (connected) {
      setLate(false);
      return;
    }
    const timer = setTimeout(() => setLate(true), graceMs);
    return () => clearTimeout(timer);
  }, [connected]);
  return (
    <div role="status" className="text-ink2 text-small">
      {late ? (
        <p className="border-rule border-b py-1">
          Not connected: what you see may be old. Jobs go on; the page catches up by itself.
        </p>
      ) : null}
    </div>
  );
}
