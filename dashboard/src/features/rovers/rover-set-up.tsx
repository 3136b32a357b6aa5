import type { SetUpCard } from '@hubtack/contracts/set-up/set-up-card.js';
import { tiltLabels } from '@hubtack/contracts/set-up/set-up-card.js';
import { useQuery } from '@tanstack/react-query';
import { Link } from 'react-router-dom';
import { CheckShotTable } from '../../components/check-shot-table';
import { DataTable } from '../../components/data-table';
import { Empty, Failed, Loading } from '../../components/query-states';
import { cardChanges } from '../../lib/card-changes';
import { checkShotsOfRoverQuery } from '../../lib/check-shots';
import { dayAndTime, utc } from '../../lib/format';
import { setUpCardsQuery } from '../../lib/set-up';
import { useMe } from '../../lib/session';

/** How a rover was set up, card by card, and what it made of control points. */
export function RoverSetUp({ roverId, mayAdd }: { roverId: number; mayAdd: boolean }) {
  const cards = useQuery(setUpCardsQuery(roverId));
  const shots = useQuery(checkShotsOfRoverQuery(roverId));
  const { timeZone } = useMe();
  return (
    <>
      <section aria-label="Set-up cards">
        <h2>Set-up cards</h2>
        {mayAdd && (
          <p className="page-actions">
            <Link to={`/rovers/${roverId}/set-up`}>New set-up card</Link>
            <Link to={`/rovers/${roverId}/check-shot`}>Check into control</Link>
          </p>
        )}
        {cards.data ? (
          <Cards cards={cards.data} zone={timeZone} />
        ) : cards.error ? (
          <Failed error={cards.error} retry={() => void cards.refetch()} />
        ) : (
          <Loading what="the set-up cards" />
        )}
      </section>
      <section aria-label="Checks into control">
        <h2>Checks into control</h2>
        {shots.data?.length === 0 && (
          <Empty title="Never checked">A check on a known mark shows what no receiver can.</Empty>
        )}
        {shots.data && shots.data.length > 0 && (
          <>
            <CheckShotTable label="Checks of this rover" shots={shots.data} zone={timeZone} of="rover" />
            <p>
              <Link to="/check-shots">All of a day, to print</Link>
            </p>
          </>
        )}
        {shots.error && <Failed error={shots.error} retry={() => void shots.refetch()} />}
      </section>
    </>
  );
}

function Cards({ cards, zone }: { cards: readonly SetUpCard[]; zone: string }) {
  if (cards.length === 0)
    return <Empty title="No set-up card yet">Its crew fills one each morning, or you do it here.</Empty>;
  const choices = cards.flatMap(({ correctionSourceId: id, sourceName, mountPoint }) =>
    id === null || mountPoint === null ? [] : [{ id, name: sourceName ?? mountPoint, mountPoint }],
  );
  return (
    <DataTable
      label="Set-up cards"
      rows={cards}
      rowKey={({ id }) => id}
      columns={[
        {
          name: 'Kept',
          cell: ({ at }) => <span title={utc(Date.parse(at))}>{dayAndTime(Date.parse(at), zone)}</span>,
        },
        { name: 'Pole', figure: true, cell: ({ poleHeightM }) => `${poleHeightM.toFixed(3)} m` },
        { name: 'Tilt', cell: ({ tilt }) => tiltLabels[tilt] },
        { name: 'Corrections', cell: ({ mountPoint }) => mountPoint ?? 'not said' },
        {
          name: 'Otherwise than before',
          cell: (card) => {
            const before = cards[cards.indexOf(card) + 1];
            const changes = before ? cardChanges(card, before, choices) : [];
            return changes.map(({ name, before: was, now }) => (
              <div key={name}>
                {name}: <del>{was}</del> <strong>{now}</strong>
              </div>
            ));
          },
        },
        { name: 'Checked by', cell: ({ checkedBy, note }) => [checkedBy, note].filter(Boolean).join(': ') },
      ]}
    />
  );
}
