import { Button } from '@fluentui/react-components';
import type { LostFix } from '@hubtack/contracts/lost-fixes/lost-fix.js';
import { useInfiniteQuery, useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import { useSearchParams } from 'react-router-dom';
import { ListPage } from '../../components/list-page';
import { Empty, Failed, Loading } from '../../components/query-states';
import { lostFixesQuery, olderLostFixes, type LostFixFilter } from '../../lib/lost-fixes';
import { DeskFilter } from './desk-filter';
import { LostFixRow } from './lost-fix-row';
import { deskGroups } from './order';
import './lost-fixes.css';

/** The desk: what is open, taken, and ended; and on demand what has been closed. The filter is in the address, so that a history is a link. */
export default function LostFixesPage() {
  const [search] = useSearchParams();
  const chosen = {
    roverId: search.get('roverId') ?? undefined,
    crewId: search.get('crewId') ?? undefined,
    mountPoint: search.get('mountPoint') ?? undefined,
  };
  const isFiltered = Object.values(chosen).some((value) => value !== undefined);
  const [showsClosed, setShowsClosed] = useState(isFiltered);
  const query = useQuery(lostFixesQuery({ ...chosen, status: 'active' }));
  return (
    <ListPage title="Lost fixes" what="the desk" query={query} action={<DeskFilter chosen={chosen} />}>
      {({ lostFixes }) => (
        <>
          {lostFixes.length === 0 && (
            <Empty title="Nothing is open">
              No fix is lost that somebody has not answered. A lost fix of half a minute raises itself here.
            </Empty>
          )}
          {deskGroups(lostFixes).map(({ name, lostFixes: group }) => (
            <section key={name} className="desk-group">
              <h2>
                {name} <small>{group.length}</small>
              </h2>
              <Rows list={group} all={lostFixes} />
            </section>
          ))}
          <section className="desk-group">
            <Button aria-expanded={showsClosed} onClick={() => setShowsClosed((before) => !before)}>
              Closed
            </Button>
            {showsClosed && <Closed filter={{ ...chosen, status: 'closed' }} />}
          </section>
          <p className="caution">
            Fixed is the receiver’s own claim. This board does not say that anybody is safe: for a quiet rover
            call the crew; the firm’s lone-work rule comes first.
          </p>
        </>
      )}
    </ListPage>
  );
}

function Rows({ list, all }: { list: readonly LostFix[]; all: readonly LostFix[] }) {
  return (
    <ul className="desk">
      {list.map((lostFix) => (
        <LostFixRow
          key={lostFix.id}
          lostFix={lostFix}
          members={lostFix.kind === 'mountPoint' ? all.filter(({ sharedId }) => sharedId === lostFix.id) : []}
        />
      ))}
    </ul>
  );
}

function Closed({ filter }: { filter: LostFixFilter }) {
  const { data, error, refetch, hasNextPage, fetchNextPage, isFetchingNextPage } = useInfiniteQuery({
    queryKey: ['closed-lost-fixes', filter],
    queryFn: ({ pageParam }) => olderLostFixes(filter, pageParam),
    initialPageParam: undefined as number | undefined,
    getNextPageParam: (page) => page.nextBefore ?? undefined,
  });
  if (error && !data) return <Failed error={error} retry={() => void refetch()} />;
  if (!data) return <Loading what="what was closed" />;
  const list = data.pages.flatMap(({ lostFixes }) => lostFixes);
  if (list.length === 0) return <Empty title="Nothing has been closed yet">It is kept here for good.</Empty>;
  return (
    <>
      <Rows list={list} all={[]} />
      {hasNextPage && (
        <Button disabled={isFetchingNextPage} onClick={() => void fetchNextPage()}>
          Older ones
        </Button>
      )}
    </>
  );
}
