import { Button } from '@fluentui/react-components';
import { displayLinkBody } from '@hubtack/contracts/displays/display-link.js';
import { useQuery } from '@tanstack/react-query';
import { CopyText } from '../../components/copy-text';
import { DataTable } from '../../components/data-table';
import { Form } from '../../components/form';
import { TextField } from '../../components/form-fields';
import { Failed, Loading } from '../../components/query-states';
import { dayAndTime } from '../../lib/format';
import { useMe } from '../../lib/session';
import { displaysQuery, useMakeDisplay, useRevokeDisplay } from '../../lib/users';

/** Links that open a read-only board on a screen on the wall. */
export function Displays() {
  const { data: displays, error, refetch } = useQuery(displaysQuery);
  const make = useMakeDisplay();
  const revoke = useRevokeDisplay();
  const { timeZone } = useMe();
  if (!displays)
    return error ? <Failed error={error} retry={() => void refetch()} /> : <Loading what="the displays" />;
  return (
    <section className="page-section">
      <h2>Wall displays</h2>
      <p>A display link opens the board read-only, without a person’s sign-in, until it is taken back.</p>
      <div className="page-narrow">
        <Form
          key={make.data?.id ?? 0}
          schema={displayLinkBody}
          defaults={{ name: '' }}
          button="Make a link"
          submit={(body) => make.mutateAsync(body)}
        >
          <TextField name="name" label="Where the screen hangs" required />
        </Form>
        {make.data && (
          <div role="status">
            <p>
              <strong>Shown only now.</strong> Open this on the screen:
            </p>
            <CopyText text={`${location.origin}/wall#${make.data.token}`} label="the display link" />
          </div>
        )}
      </div>
      {displays.length > 0 && (
        <DataTable
          label="Wall displays"
          rows={displays}
          rowKey={({ id }) => id}
          columns={[
            { name: 'Display', cell: ({ name }) => name },
            { name: 'Made', cell: ({ createdAt }) => dayAndTime(Date.parse(createdAt), timeZone) },
            {
              name: 'Last opened',
              cell: ({ lastOpenedAt }) =>
                lastOpenedAt === null ? 'never' : dayAndTime(Date.parse(lastOpenedAt), timeZone),
            },
            {
              name: 'Standing',
              cell: ({ id, name }) => (
                <Button
                  size="small"
                  disabled={revoke.isPending}
                  onClick={() => revoke.mutate(id)}
                  aria-label={`Take back ${name}`}
                >
                  Take back
                </Button>
              ),
            },
          ]}
        />
      )}
    </section>
  );
}
