import type { JobView } from '@nightcone/contracts';
import { CopyButton } from '../../components/copy-button.tsx';
import { addressOf } from '../../lib/api.ts';
import { formatBytes } from '../../lib/format-quantity.ts';

const formats = [
  { format: 'json', label: 'JSON', what: 'inputs, arrays, certificate' },
  { format: 'csv', label: 'CSV', what: 'one table for each array' },
  { format: 'npz', label: '.npz', what: 'NumPy arrays' },
] as const;

export function Downloads({ job }: { job: JobView }) {
  const bytes = job.arrays.reduce((sum, array) => sum + array.bytes, 0);
  return (
    <section aria-labelledby="downloads">
      <h3 id="downloads">Take it with you</h3>
      <ul className="text-small">
        {job.resultDigest
          ? formats.map(({ format, label, what }) => (
              <li key={format} className="flex items-baseline justify-between gap-4 border-hair border-b py-[5px]">
                <a
                  href={addressOf('exportJob', { params: { hash: job.hash }, query: { format } })}
                  download
                  className="link"
                >
                  {label}
                </a>
                <span className="text-right text-ink3">{what}</span>
              </li>
            ))
          : null}
        <li className="flex items-baseline justify-between gap-4 py-[5px]">
          <CopyButton text={job.canonicalText}>Copy specification</CopyButton>
          <span className="text-right text-ink3">for the command line</span>
        </li>
      </ul>
      {job.resultDigest ? (
        <p className="mt-1 text-ink3 text-least">
          {job.arrays.length} arrays, {formatBytes(bytes)} raw.
        </p>
      ) : null}
    </section>
  );
}
