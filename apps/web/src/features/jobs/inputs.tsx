import type { JobView } from '@nightcone/contracts';
import { findModel, type SpecificationBody } from '@nightcone/models';
import { ShortHash } from '../../components/hash-comb.tsx';
import { Facts } from '../../components/sheet.tsx';
import { SymbolText } from '../../plots/symbol-text.tsx';
import { describeInputs, type InputRow } from './describe-inputs.ts';

/** What was asked: first what differs from the defaults, then the rest folded, then the program and the hashed text. */
export function Inputs({ job }: { job: JobView }) {
  const model = findModel(job.model);
  const rows = model ? describeInputs(model, job.specification as unknown as SpecificationBody) : [];
  const changed = rows.filter((row) => !row.isDefault);
  const defaults = rows.filter((row) => row.isDefault);
  return (
    <section aria-labelledby="inputs">
      <h3 id="inputs">Inputs</h3>
      <Facts
        rows={[...changed.map(factOf), { name: 'program', value: <ShortHash hash={job.kernel} />, key: '/kernel' }]}
      />
      {defaults.length > 0 ? (
        <details className="mt-1 text-small">
          <summary className="cursor-pointer py-1">{defaults.length} more at their defaults</summary>
          <Facts rows={defaults.map(factOf)} />
        </details>
      ) : null}
      <details className="mt-1 text-small">
        <summary className="cursor-pointer py-1">What is hashed</summary>
        <p className="mb-1 text-ink3">The SHA-256 of this text is the job hash.</p>
        {/* biome-ignore lint/a11y/noNoninteractiveTabindex: a scrolled region must be reachable by keyboard */}
        <pre tabIndex={0} className="max-h-64 overflow-auto whitespace-pre-wrap break-all bg-field p-2.5">
          {job.canonicalText}
        </pre>
      </details>
    </section>
  );
}

const factOf = (row: InputRow) => ({
  key: row.pointer,
  name: (
    <>
      {row.symbol ? (
        <>
          <SymbolText tex={row.symbol} />{' '}
        </>
      ) : null}
      {row.name}
    </>
  ),
  value: row.value,
});
