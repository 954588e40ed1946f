import type { Certificate as CertificateShape, NoteSummary } from '@nightcone/contracts';
import { findModel, noteText } from '@nightcone/models';
import { Facts, MarginEntry } from '../../components/sheet.tsx';
import { Mark } from '../../components/state-mark.tsx';
import { formatCount, formatNumber, formatQuantity, formatSmall } from '../../lib/format-quantity.ts';

/** `largestResidualEv` → largest residual: the unit at the end of a name stands with the number. */
export function numberWords(name: string): string {
  return name
    .replace(/(Ev|Nm|PerNm|T|Ms)$/, '')
    .replace(/([a-z])([A-Z])/g, '$1 $2')
    .toLowerCase();
}

const sizeOfError = /residual|error|tolerance|bound|difference/i;

/** What the execution says of its own quality. */
export function CertificateEntry({ model, certificate }: { model: string; certificate: CertificateShape }) {
  const units = new Map(findModel(model)?.certificate.map(({ name, unit }) => [name, unit]));
  return (
    <MarginEntry level="major" title="Certificate">
      <Facts
        rows={Object.entries(certificate.numbers).map(([name, value]) => {
          const unit = units.get(name) ?? '';
          const text = sizeOfError.test(name)
            ? formatSmall(value, unit)
            : unit === '' && Number.isInteger(value)
              ? formatCount(value)
              : formatQuantity(value, unit);
          return { key: name, name: numberWords(name), value: text };
        })}
      />
    </MarginEntry>
  );
}

/** The closed forms that apply to this job, computed against expected. */
export function ChecksEntry({ model, certificate }: { model: string; certificate: CertificateShape }) {
  const definitions = findModel(model)?.checks ?? [];
  const { checks } = certificate;
  const held = checks.filter((check) => check.holds).length;
  const others = definitions.filter((definition) => !checks.some((check) => check.code === definition.code));
  return (
    <MarginEntry title="Closed-form checks">
      {checks.length > 0 ? (
        <table className="mt-1 w-full text-small">
          <thead>
            <tr className="border-hair border-b text-ink3">
              <th scope="col" className="py-1 text-left font-normal">
                holds
              </th>
              <th scope="col" className="py-1 pr-3 text-right font-normal">
                computed
              </th>
              <th scope="col" className="py-1 text-right font-normal">
                expected
              </th>
            </tr>
          </thead>
          <tbody>
            {checks.map((check) => {
              const definition = definitions.find(({ code }) => code === check.code);
              const unit = definition?.unit ?? '';
              return (
                <tr key={check.code} className="border-hair border-b align-baseline">
                  <th scope="row" className="py-[5px] pr-2 text-left font-normal">
                    <span className="inline-flex items-baseline gap-2" title={definition?.display?.source}>
                      <Mark shape={check.holds ? 'tick' : 'cross'} className="translate-y-px" />
                      <span>
                        {definition?.display?.title ?? numberWords(check.code.replaceAll('-', ' '))}
                        <span className="sr-only">{check.holds ? ', holds' : ', does not hold'}</span>
                      </span>
                    </span>
                  </th>
                  <td className="num whitespace-nowrap py-[5px] pr-3 text-right">
                    {check.expected === 0 ? formatSmall(check.computed, unit) : formatQuantity(check.computed, unit)}
                  </td>
                  <td className="num whitespace-nowrap py-[5px] text-right text-ink3">
                    {formatNumber(check.expected)}
                  </td>
                </tr>
              );
            })}
          </tbody>
        </table>
      ) : null}
      <p className="mt-1.5 text-ink2 text-least">
        {checks.length === 0
          ? 'No closed form applies to these inputs.'
          : held === checks.length
            ? `All ${checks.length} checks that apply hold.`
            : `${checks.length - held} of ${checks.length} checks do not hold: read the numbers with that in mind.`}
        {others.length > 0
          ? ` Not applicable here: ${others.map((each) => each.display?.title ?? each.code).join(', ')}.`
          : ''}
      </p>
    </MarginEntry>
  );
}

const severityWords = { note: '', caution: 'Caution. ', refuse: 'Outside the model. ' };

/** Where the model stops to be right, with the number that decides. */
export function ValidityEntry({ model, notes }: { model: string; notes: readonly NoteSummary[] }) {
  const definition = findModel(model);
  if (notes.length === 0) return null;
  return (
    <MarginEntry title="Validity">
      <ul className="mt-1 flex flex-col gap-2 text-small">
        {notes.map((note) => (
          <li key={`${note.code} ${note.field}`}>
            <strong className="font-semibold">{severityWords[note.severity]}</strong>
            {definition ? noteText(definition, { ...note, value: note.worst }) : note.code}
          </li>
        ))}
      </ul>
    </MarginEntry>
  );
}
