import { findModel, type ModelDefinition } from '@nightcone/models';
import type { ReactNode } from 'react';
import { Link, useParams } from 'react-router-dom';
import { ButtonLink } from '../../../components/button.tsx';
import { HashMark } from '../../../components/hash-comb.tsx';
import { Page } from '../../../components/page.tsx';
import { Empty } from '../../../components/problem-note.tsx';
import { MarginEntry, SheetRow } from '../../../components/sheet.tsx';
import { useSession } from '../../../lib/session.ts';
import { SymbolText } from '../../../plots/symbol-text.tsx';
import { InputsTable } from './inputs-table.tsx';
import { Prose } from './prose.tsx';
import { ScrollRegion } from './scroll-region.tsx';

/** Equations, units, numerics, validity, sources and checks of one model, from its definition. */
export function Component() {
  const { model: id = '' } = useParams();
  const model = findModel(id);
  if (!model)
    return (
      <Page title="Methods">
        <Empty title="There is no such model" actions={<ButtonLink to="/methods">All methods</ButtonLink>}>
          <p>
            <code>{id}</code> is not a model of the current program.
          </p>
        </Empty>
      </Page>
    );
  return <Method model={model} />;
}

function Method({ model }: { model: ModelDefinition }) {
  const { kernel } = useSession();
  const { methods } = model;
  return (
    <Page
      title={`${model.title}: methods`}
      heading={model.title}
      lead={
        <span>
          {model.summary} <code>{model.id}</code>
        </span>
      }
      actions={<ButtonLink to={`/question/${model.id}`}>Ask this question</ButtonLink>}
    >
      <SheetRow
        margin={
          <>
            {kernel ? (
              <MarginEntry title="Program">
                <div className="mt-1">
                  <HashMark hash={kernel.digest} what="digest of the program" radius={24} />
                </div>
                <p className="mt-1 text-ink2 text-small">Version {kernel.version}, which computes new questions.</p>
              </MarginEntry>
            ) : null}
            <Sources sources={methods.sources} />
          </>
        }
      >
        <Section id="equations" title="Equations" text={methods.equations} />
      </SheetRow>
      <SheetRow margin={<Pitfalls pitfalls={methods.pitfalls} />}>
        <Section id="numerics" title="Numerics" text={methods.numerics} />
        <Section id="validity" title="Validity" text={methods.validity} />
      </SheetRow>
      <SheetRow divided>
        <Part id="inputs" title="Inputs and units">
          <InputsTable fields={model.parameters} caption="Parameters" />
          <h3 className="mt-5">Numerics</h3>
          <InputsTable fields={model.numerics} caption="Numerics" />
        </Part>
      </SheetRow>
      <SheetRow divided>
        <Results model={model} />
        <Checks model={model} />
        <Examples model={model} />
      </SheetRow>
    </Page>
  );
}

function Part({ id, title, children }: { id: string; title: string; children: ReactNode }) {
  return (
    <section aria-labelledby={id} className="mt-5 first:mt-0">
      <h2 id={id}>{title}</h2>
      {children}
    </section>
  );
}

const Section = ({ id, title, text }: { id: string; title: string; text: string }) =>
  text ? (
    <Part id={id} title={title}>
      <Prose text={text} />
    </Part>
  ) : null;

function Sources({ sources }: { sources: readonly string[] }) {
  if (sources.length === 0) return null;
  return (
    <MarginEntry title="Sources">
      <ul className="mt-1 text-small">
        {sources.map((source) => (
          <li key={source} className="py-1">
            {source}
          </li>
        ))}
      </ul>
    </MarginEntry>
  );
}

function Pitfalls({ pitfalls }: { pitfalls: readonly string[] }) {
  if (pitfalls.length === 0) return null;
  return (
    <MarginEntry title="Where one slips">
      <ul className="mt-1 text-small">
        {pitfalls.map((pitfall) => (
          <li key={pitfall} className="py-1">
            {pitfall}
          </li>
        ))}
      </ul>
    </MarginEntry>
  );
}

function Results({ model }: { model: ModelDefinition }) {
  if (model.results.length === 0) return null;
  return (
    <Part id="results" title="Results">
      <ScrollRegion label="Table of results">
        <table className="mt-2 w-full min-w-[36rem] text-small">
          <thead>
            <tr className="border-rule border-b text-left">
              <th scope="col" className="py-1 pr-4 font-semibold">
                array
              </th>
              <th scope="col" className="py-1 pr-4 font-semibold">
                along
              </th>
              <th scope="col" className="py-1 pr-4 font-semibold">
                unit
              </th>
              <th scope="col" className="py-1 font-semibold">
                what it is
              </th>
            </tr>
          </thead>
          <tbody>
            {model.results.map((result) => (
              <tr key={result.name} className="border-hair border-b align-baseline">
                <th scope="row" className="py-1 pr-4 text-left font-normal">
                  <code>{result.name}</code>
                </th>
                <td className="py-1 pr-4">{result.dims.join(', ') || 'one value'}</td>
                <td className="num py-1 pr-4">{result.unit}</td>
                <td className="py-1">
                  {result.display?.symbol ? <SymbolText tex={result.display.symbol} className="mr-2" /> : null}
                  {result.display?.title}
                  {result.display?.help ? <span className="text-ink2">. {result.display.help}</span> : null}
                </td>
              </tr>
            ))}
          </tbody>
        </table>
      </ScrollRegion>
    </Part>
  );
}

function Checks({ model }: { model: ModelDefinition }) {
  if (model.checks.length === 0) return null;
  return (
    <Part id="checks" title="Checks of the certificate">
      <table className="mt-2 w-full text-small">
        <thead>
          <tr className="border-rule border-b text-left">
            <th scope="col" className="py-1 pr-4 font-semibold">
              check
            </th>
            <th scope="col" className="py-1 font-semibold">
              against
            </th>
          </tr>
        </thead>
        <tbody>
          {model.checks.map((check) => (
            <tr key={check.code} className="border-hair border-b align-baseline">
              <th scope="row" className="py-1 pr-4 text-left font-normal">
                {check.display?.title ?? check.code}
              </th>
              <td className="py-1">{check.display?.source}</td>
            </tr>
          ))}
        </tbody>
      </table>
    </Part>
  );
}

function Examples({ model }: { model: ModelDefinition }) {
  if (model.examples.length === 0) return null;
  return (
    <Part id="examples" title="Worked examples">
      <ul className="mt-1">
        {model.examples.map((example) => (
          <li key={example.id} className="border-hair border-b py-2">
            <Link to={`/question/${model.id}?example=${example.id}`} className="link font-semibold">
              {example.title}
            </Link>
            <p className="text-small">{example.question}</p>
            <p className="text-ink3 text-least">{example.source}</p>
          </li>
        ))}
      </ul>
    </Part>
  );
}
