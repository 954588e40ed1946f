import { useSession } from '../lib/session.ts';

/** The caution stands here once, plainly. */
export function Footer() {
  const { group, kernel } = useSession();
  return (
    <footer className="mt-8 flex flex-col gap-2 border-hair border-t py-5 text-ink3 text-least">
      <p className="max-w-[110ch] text-pretty">
        Results are predictions of a model, not device or safety ratings. A continuum result outside its range of
        validity is wrong however precise. Where a prediction is used for the design of apparatus (high-field magnets,
        cryogenics, electrical devices), follow the local rules of the laboratory and the licensed people responsible
        for it.
      </p>
      <p className="flex flex-wrap gap-x-5 gap-y-1">
        <span>{group.name}</span>
        <span>clock times: {group.timeZone}</span>
        {kernel ? (
          <span>
            program {kernel.version} <code>{kernel.digest.slice(0, 12)}</code>
          </span>
        ) : null}
        <a className="link" href="/api/docs">
          HTTP interface
        </a>
      </p>
    </footer>
  );
}
