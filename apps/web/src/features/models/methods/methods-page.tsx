import { models } from '@nightcone/models';
import { Link } from 'react-router-dom';
import { Page } from '../../../components/page.tsx';
import { SheetRow } from '../../../components/sheet.tsx';

/** All models and what the rest of the method is: one program, one hash, one certificate. */
export function Component() {
  return (
    <Page title="Methods" lead="What is computed, in which units, by which methods, and how far to trust it.">
      <SheetRow>
        <ul>
          {models.map((model) => (
            <li key={model.id} className="border-hair border-b py-4 first:pt-0">
              <h2>
                <Link
                  to={`/methods/${model.id}`}
                  className="underline decoration-1 decoration-rule underline-offset-4 hover:decoration-ink"
                >
                  {model.title}
                </Link>
              </h2>
              <p className="mt-1 max-w-[72ch]">{model.question}</p>
              <p className="text-ink2 text-small">{model.summary}</p>
            </li>
          ))}
        </ul>
        <section aria-labelledby="common" className="mt-6 max-w-[72ch]">
          <h2 id="common">Common to all models</h2>
          <p className="mt-2">
            All numbers are made by one small program, the kernel, in arithmetic that is the same on every machine. Its
            digest, the model and every input, defaults written out, make the job hash: the same inputs are the same
            job, and give the same bits.
          </p>
          <p className="mt-2">
            Energies are in eV, lengths in nm, fields in T, wave numbers in 1/nm. A result carries a certificate: the
            largest residual, the number of levels proved by counting against the number found, an estimate of the error
            of the grid, and checks against closed forms wherever one exists.
          </p>
          <p className="mt-2">
            A continuum result outside its range of validity is wrong however precise it is. The form and the job say so
            in words, with the number that decides.
          </p>
        </section>
      </SheetRow>
    </Page>
  );
}
