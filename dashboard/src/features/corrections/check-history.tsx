import type { CorrectionCheckList } from '@hubtack/contracts/corrections/check.js';
import { Link } from 'react-router-dom';
import { DataTable } from '../../components/data-table';
import { dayAndTime, utc } from '../../lib/format';
import { useMe } from '../../lib/session';
import { capitalised, verdictOf } from './check-words';
import { OutcomeMark } from './outcome-mark';

interface CheckHistoryProps {
  checks: CorrectionCheckList['checks'];
  shownId: number | undefined;
  linkTo: (checkId: number) => string;
}

/** What was found before: a fault is easier to name beside what was there when it worked. */
export function CheckHistory({ checks, shownId, linkTo }: CheckHistoryProps) {
  const { timeZone } = useMe();
  return (
    <section className="page-section" aria-label="Checks so far">
      <h2>Checks so far</h2>
      <DataTable
        label="Checks so far"
        rows={checks}
        rowKey={({ id }) => id}
        columns={[
          {
            name: 'When',
            cell: ({ id, startedAt }) => (
              <span>
                <Link
                  to={linkTo(id)}
                  className="check-link"
                  title={utc(Date.parse(startedAt))}
                  aria-current={id === shownId ? 'true' : undefined}
                >
                  {dayAndTime(Date.parse(startedAt), timeZone)}
                </Link>
                {id === shownId && <small> shown above</small>}
              </span>
            ),
          },
          { name: 'Result', cell: (check) => <OutcomeMark {...capitalised(verdictOf(check))} /> },
          { name: 'For', cell: ({ place }) => place ?? '–' },
          { name: 'By', cell: ({ by }) => by ?? 'the timetable' },
        ]}
      />
    </section>
  );
}
