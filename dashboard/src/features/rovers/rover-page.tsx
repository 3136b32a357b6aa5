import { Button } from '@fluentui/react-components';
import { useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import { Link, useParams } from 'react-router-dom';
import { Failed, Loading } from '../../components/query-states';
import '../../components/data-table.css';
import { roverQuery } from '../../lib/rovers';
import { useMe } from '../../lib/session';
import { LastHeard } from './last-heard';
import { RoverAssignments } from './rover-assignments';
import { ChangeRover } from './rover-form';
import { RoverKeys } from './rover-keys';
import { RoverSetUp } from './rover-set-up';
import './rover-page.css';

export default function RoverPage() {
  const id = Number(useParams().id);
  const { data: rover, error, refetch } = useQuery(roverQuery(id));
  const { role } = useMe();
  const [isChanging, setIsChanging] = useState(false);
  const isTechnician = role === 'technician' || role === 'manager';
  if (!rover)
    return error ? <Failed error={error} retry={() => void refetch()} /> : <Loading what="the rover" />;
  return (
    <>
      <p className="back">
        <Link to="/rovers">All rovers</Link>
      </p>
      <div className="page-head">
        <h1>{rover.label}</h1>
        {isTechnician && <Button onClick={() => setIsChanging(true)}>Change</Button>}
      </div>
      <dl className="facts">
        <div>
          <dt>Receiver</dt>
          <dd>{rover.receiver ?? '–'}</dd>
        </div>
        <div>
          <dt>Serial number</dt>
          <dd>{rover.serial ?? '–'}</dd>
        </div>
        <div>
          <dt>Mount point</dt>
          <dd>{rover.mountPoint ?? 'not set'}</dd>
        </div>
        <div>
          <dt>Last heard</dt>
          <dd>
            <LastHeard at={rover.lastHeardAt} />
          </dd>
        </div>
        <div>
          <dt>In use</dt>
          <dd>{rover.retired ? 'put away' : 'yes'}</dd>
        </div>
      </dl>
      {role !== 'crewChief' && <RoverAssignments rover={rover} />}
      {isTechnician && <RoverKeys rover={rover} />}
      <RoverSetUp roverId={id} mayAdd={isTechnician} />
      <p className="caution">
        A rover’s positions say where people were: tell the crew that they are kept, and for how long. Heights
        need the right pole height and measuring point; a wrong one shifts every point taken.
      </p>
      {isChanging && <ChangeRover rover={rover} onDone={() => setIsChanging(false)} />}
    </>
  );
}
