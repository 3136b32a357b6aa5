import { Button, Input } from '@fluentui/react-components';
import { useQuery } from '@tanstack/react-query';
import { useSearchParams } from 'react-router-dom';
import { CheckShotTable } from '../../components/check-shot-table';
import { Empty, Failed, Loading } from '../../components/query-states';
import { checkShotsOfDayQuery } from '../../lib/check-shots';
import { zoneName } from '../../lib/format';
import { useMe } from '../../lib/session';
import { useServerNow } from '../../live/use-lanes';
import { localDate } from './local-date';
import './check-shots.css';

const DATE = /^\d{4}-\d{2}-\d{2}$/;

/** The checks into control of a day, as a sheet that can be printed and signed. */
export default function CheckShotsPage() {
  const { timeZone, firmName } = useMe();
  const now = useServerNow();
  const [asked, setAsked] = useSearchParams();
  const given = asked.get('date') ?? '';
  const date = DATE.test(given) ? given : localDate(now, timeZone);
  const { data, error, refetch } = useQuery(checkShotsOfDayQuery(date));
  const words = new Date(`${date}T00:00:00Z`).toLocaleDateString('en-GB', {
    dateStyle: 'full',
    timeZone: 'UTC',
  });
  return (
    <div className="check-sheet">
      <div className="page-head">
        <div>
          <h1>Checks into control</h1>
          <p>
            {firmName}, {words}, times of {zoneName(Date.parse(`${date}T12:00:00Z`), timeZone)}
          </p>
        </div>
        <div className="page-actions check-sheet-tools">
          <Input
            type="date"
            aria-label="Day"
            value={date}
            onChange={(_, { value }) => DATE.test(value) && setAsked({ date: value }, { replace: true })}
          />
          <Button onClick={() => window.print()}>Print</Button>
        </div>
      </div>
      {error && !data && <Failed error={error} retry={() => void refetch()} />}
      {!data && !error && <Loading what="the check shots" />}
      {data?.length === 0 && (
        <Empty title="No check on this day">
          A crew checks its rover on a control point from its own page, or a technician from the rover’s.
        </Empty>
      )}
      {data && data.length > 0 && (
        <CheckShotTable label="Checks into control" shots={data} zone={timeZone} of="day" />
      )}
      <p className="caution">
        Differences are rover less control point, in the local frame at the control point; nothing is
        transformed between datums. A passed check vouches for the base, the pole and the fix of that moment
        only. The licensed surveyor in charge, and local rules, decide what is acceptable.
      </p>
      <div className="check-sheet-signature" aria-hidden>
        <span>Seen by</span>
        <span>Licensed surveyor in charge</span>
        <span>Date</span>
      </div>
    </div>
  );
}
