import { AdminPage } from '../../components/admin-page.tsx';
import { Clock } from '../../components/clock.tsx';
import { Empty } from '../../components/problem-note.tsx';
import { QueryView } from '../../components/query-view.tsx';
import { StateMark } from '../../components/state-mark.tsx';
import { plural } from '../../lib/format-quantity.ts';
import { useApi } from '../../lib/query.ts';

/** Worker processes, their slots and their last sign of life. */
export function Component() {
  return (
    <AdminPage title="Workers" lead="Processes that compute. More can join from any machine that reaches the database.">
      <Workers />
    </AdminPage>
  );
}

function Workers() {
  const query = useApi('listWorkers');
  return (
    <QueryView query={query} what="the workers">
      {({ rows }) =>
        rows.length === 0 ? (
          <Empty title="No worker runs">
            Work waits until one does: <code>npm run worker</code> with the database’s address.
          </Empty>
        ) : (
          <table className="mt-4 w-full text-small">
            <caption className="sr-only">Workers</caption>
            <thead>
              <tr className="border-hair border-b text-left text-ink2">
                <th scope="col" className="py-1.5 pr-4 font-normal">
                  State
                </th>
                <th scope="col" className="py-1.5 pr-4 font-normal">
                  Worker
                </th>
                <th scope="col" className="py-1.5 pr-4 text-right font-normal">
                  Busy
                </th>
                <th scope="col" className="py-1.5 pr-4 text-right font-normal max-md:hidden">
                  Speed
                </th>
                <th scope="col" className="py-1.5 text-right font-normal">
                  Last sign of life
                </th>
              </tr>
            </thead>
            <tbody>
              {rows.map((worker) => (
                <tr key={worker.id} className="border-hair border-b">
                  <td className="py-[7px] pr-4">
                    <StateMark state={worker.state}>{worker.state === 'active' ? 'works' : undefined}</StateMark>
                  </td>
                  <td className="py-[7px] pr-4">
                    {worker.host} <code className="text-ink3 max-md:hidden">{worker.id}</code>
                  </td>
                  <td className="num py-[7px] pr-4 text-right">
                    {worker.busy} of {plural(worker.slots, 'slot')}
                  </td>
                  <td className="num py-[7px] pr-4 text-right max-md:hidden">× {worker.speedFactor.toFixed(2)}</td>
                  <td className="py-[7px] text-right">
                    <Clock at={worker.heartbeatAt} />
                  </td>
                </tr>
              ))}
            </tbody>
          </table>
        )
      }
    </QueryView>
  );
}
