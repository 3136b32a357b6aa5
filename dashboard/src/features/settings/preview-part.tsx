import { Button } from '@fluentui/react-components';
import { wholeOf } from '@hubtack/contracts/fixes/totals.js';
import { preview, previewBody, type Preview } from '@hubtack/contracts/weekly/preview.js';
import { useMutation } from '@tanstack/react-query';
import { useFormContext } from 'react-hook-form';
import { api } from '../../lib/api';
import { duration } from '../../lib/format';
import { percent } from '../../lib/percent';

const length = (ms: number | null): string => (ms === null ? 'no data' : duration(ms));

/** What the limits and the profile in the form would make of last week, before anything is saved. */
export function PreviewPart() {
  const form = useFormContext();
  const ask = useMutation({
    mutationFn: async (): Promise<Preview> => {
      const body = previewBody.safeParse(form.getValues());
      if (!body.success) throw new Error('Something above is not right yet.');
      return api(preview, 'POST', '/api/weekly/preview', body.data);
    },
  });
  return (
    <div className="preview">
      <Button disabled={ask.isPending} onClick={() => ask.mutate()}>
        What would it change?
      </Button>
      {ask.error && <p role="alert">{ask.error.message}</p>}
      {ask.data && <Difference data={ask.data} />}
    </div>
  );
}

function Difference({ data: { week, before, after, shifts } }: { data: Preview }) {
  const lines = [
    ['Lost fixes', String(before.lostFixes), String(after.lostFixes)],
    ['Time to regain, mean', length(before.regain.meanMs), length(after.regain.meanMs)],
    ['Time to first fix, mean', length(before.firstFix.meanMs), length(after.firstFix.meanMs)],
    [
      'Within tolerance',
      percent(before.withinToleranceMs, wholeOf(before.totals)),
      percent(after.withinToleranceMs, wholeOf(after.totals)),
    ],
  ];
  return (
    <div role="status">
      <table className="week-figures">
        <thead>
          <tr>
            <th scope="col">Week {Number(week.slice(6))}</th>
            <th scope="col">now</th>
            <th scope="col">then</th>
          </tr>
        </thead>
        <tbody>
          {lines.map(([name, now, then]) => (
            <tr key={name}>
              <th scope="row">{name}</th>
              <td>{now}</td>
              <td>{now === then ? 'the same' : then}</td>
            </tr>
          ))}
        </tbody>
      </table>
      <p>
        Saving other limits works {shifts} rover-shifts out again, which takes some minutes at most. A changed
        profile counts for as long as raw epochs are kept; older weeks stay as they are. Fix uptime does not
        depend on either.
      </p>
    </div>
  );
}
