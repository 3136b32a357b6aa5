import { Button } from '@fluentui/react-components';
import { useInfiniteQuery } from '@tanstack/react-query';
import { DataTable } from '../../components/data-table';
import { Failed, Loading } from '../../components/query-states';
import { dayAndTime } from '../../lib/format';
import { useMe } from '../../lib/session';
import { auditQuery } from '../../lib/users';

const words = (value: unknown): string =>
  typeof value === 'string' ? value : value === null ? '–' : JSON.stringify(value);

/** What became of what: only the fields that differ. */
function difference(before: Record<string, unknown> | null, after: Record<string, unknown> | null): string {
  if (!after) return '';
  return Object.entries(after)
    .filter(([field, value]) => !before || words(before[field]) !== words(value))
    .map(([field, value]) =>
      before ? `${field}: ${words(before[field])} → ${words(value)}` : `${field}: ${words(value)}`,
    )
    .join('; ');
}

/** Who changed what, the newest first. */
export function AuditTrail() {
  const { data, error, refetch, hasNextPage, fetchNextPage, isFetchingNextPage } =
    useInfiniteQuery(auditQuery);
  const { timeZone } = useMe();
  if (!data)
    return error ? <Failed error={error} retry={() => void refetch()} /> : <Loading what="the changes" />;
  const entries = data.pages.flatMap((page) => page.entries);
  return (
    <section className="page-section">
      <h2>Changes</h2>
      {entries.length === 0 ? (
        <p>Nothing has been changed yet.</p>
      ) : (
        <DataTable
          label="Changes"
          rows={entries}
          rowKey={({ id }) => id}
          columns={[
            { name: 'When', cell: ({ at }) => dayAndTime(Date.parse(at), timeZone) },
            { name: 'Who', cell: ({ actor }) => actor },
            { name: 'What', cell: ({ action }) => action },
            { name: 'Of', cell: ({ subject }) => subject },
            { name: 'Difference', cell: ({ before, after }) => difference(before, after) },
          ]}
        />
      )}
      {hasNextPage && (
        <Button disabled={isFetchingNextPage} onClick={() => void fetchNextPage()}>
          Show older ones
        </Button>
      )}
    </section>
  );
}
