import { AdminPage } from '../../components/admin-page.tsx';
import { Clock } from '../../components/clock.tsx';
import { ShortHash } from '../../components/hash-comb.tsx';
import { Empty } from '../../components/problem-note.tsx';
import { QueryView } from '../../components/query-view.tsx';
import { StateMark } from '../../components/state-mark.tsx';
import { addressOf } from '../../lib/api.ts';
import { formatBytes } from '../../lib/format-quantity.ts';
import { useApi } from '../../lib/query.ts';

/** Every released program stays stored and can be run. */
export function Component() {
  return (
    <AdminPage title="Programs" lead="The programs that do all numerical work, each under the SHA-256 of its bytes.">
      <Programs />
    </AdminPage>
  );
}

function Programs() {
  const query = useApi('listKernels');
  return (
    <QueryView query={query} what="the programs">
      {({ rows }) =>
        rows.length === 0 ? (
          <Empty title="No program is stored">Set-up stores the released ones; run it again.</Empty>
        ) : (
          <ul className="mt-4 border-hair border-t">
            {rows.map((kernel) => (
              <li
                key={kernel.digest}
                className="grid grid-cols-2 items-baseline gap-x-6 gap-y-1 border-hair border-b py-2 text-small md:grid-cols-[8rem_6rem_1fr_7rem_14rem]"
              >
                <StateMark state={kernel.state} />
                <span className="num">{kernel.version}</span>
                <ShortHash hash={kernel.digest} />
                <a
                  className="link num justify-self-end"
                  download={`nightcone-${kernel.version}.wasm`}
                  href={addressOf('getKernelModule', { params: { digest: kernel.digest } })}
                  aria-label={`Download program ${kernel.version}, ${formatBytes(kernel.bytes)}`}
                >
                  {formatBytes(kernel.bytes)}
                </a>
                <span className="text-ink2 md:text-right">
                  released <Clock at={kernel.releasedAt} />
                </span>
              </li>
            ))}
          </ul>
        )
      }
    </QueryView>
  );
}
