import { Button } from '@fluentui/react-components';
import type { SetUpCard, SetUpCardBody, SetUpStart } from '@hubtack/contracts/set-up/set-up-card.js';
import { useQuery, useQueryClient } from '@tanstack/react-query';
import { useState } from 'react';
import { Link, useParams } from 'react-router-dom';
import { Failed, Loading } from '../../components/query-states';
import { dayAndTime } from '../../lib/format';
import { setUpStartQuery } from '../../lib/set-up';
import { useMe } from '../../lib/session';
import { SetUpForm } from './set-up-form';
import { useSaveCard } from './use-save-card';
import './set-up.css';

/** The set-up card of a rover: filled at the start of the day by whoever sets it up. */
export default function SetUpPage() {
  const roverId = Number(useParams().id);
  const { data, error, refetch } = useQuery(setUpStartQuery(roverId));
  if (data) return <SetUp key={roverId} roverId={roverId} start={data} />;
  if (error) return <Failed error={error} retry={() => void refetch()} />;
  return <Loading what="the card before" />;
}

function SetUp({ roverId, start }: { roverId: number; start: SetUpStart }) {
  const { role, timeZone } = useMe();
  const save = useSaveCard();
  const client = useQueryClient();
  // The card as it was when somebody began: a newer one must not change the form under the hand.
  const [begun] = useState(start);
  const [from, setFrom] = useState<SetUpCard | 'empty' | null>(begun.card ? null : 'empty');
  const [kept, setKept] = useState<'saved' | 'waiting' | null>(null);
  const home = role === 'crewChief' ? '/my-crew' : `/rovers/${roverId}`;
  if (kept)
    return (
      <div className="set-up" role="status">
        <h1>{kept === 'saved' ? 'The card is kept' : 'The card waits on this phone'}</h1>
        <p>
          {kept === 'saved'
            ? 'The office sees it on the board.'
            : 'There is no signal. It is sent by itself once there is.'}
        </p>
        <p className="set-up-next">
          <Link to={`/rovers/${roverId}/check-shot`}>Check into control now</Link>
          <Link to={home}>{role === 'crewChief' ? 'My crew' : 'The rover'}</Link>
        </p>
      </div>
    );
  const keep = async (body: SetUpCardBody) => {
    const answer = await save(body);
    setKept(answer === 'waiting' ? 'waiting' : 'saved');
  };
  return (
    <div className="set-up">
      <p>
        <Link to={home}>{role === 'crewChief' ? 'My crew' : 'The rover'}</Link>
      </p>
      <h1>Set-up card</h1>
      {from === null && begun.card ? (
        <div className="set-up-start">
          <p>
            The card before is of {dayAndTime(Date.parse(begun.card.at), timeZone)}, by {begun.card.checkedBy}
            : pole {begun.card.poleHeightM.toFixed(3)} m, {begun.card.mountPoint ?? 'no mount point'}.
          </p>
          <Button appearance="primary" onClick={() => setFrom(begun.card)}>
            Start from it
          </Button>
          <Button onClick={() => setFrom('empty')}>Start empty</Button>
        </div>
      ) : (
        <SetUpForm
          roverId={roverId}
          start={begun}
          from={from === 'empty' || from === null ? null : from}
          save={keep}
          readNewest={() => client.fetchQuery(setUpStartQuery(roverId)).then(({ card }) => card)}
        />
      )}
      <p className="caution">
        Heights need the right pole height and measuring point. What is acceptable is decided by the licensed
        surveyor in charge and by local rules; check into known control before work.
      </p>
    </div>
  );
}
