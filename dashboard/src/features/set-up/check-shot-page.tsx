import { useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import { Link, useParams } from 'react-router-dom';
import type { CheckShot, CheckShotBody, CheckShotResult } from '@hubtack/contracts/set-up/check-shot.js';
import { Button } from '@fluentui/react-components';
import { Empty, Failed, Loading } from '../../components/query-states';
import { controlPointsQuery } from '../../lib/control-points';
import { useAddCheckShot, usePreviewCheckShot } from '../../lib/check-shots';
import { useMe } from '../../lib/session';
import { useLane } from '../../live/use-lanes';
import { nearestPoints } from './nearest-points';
import { ShotForm } from './shot-form';
import { ShotResult } from './shot-result';
import './set-up.css';

/** A check into control: what the rover makes of a mark whose position is known. */
export default function CheckShotPage() {
  const roverId = Number(useParams().id);
  const { data, error, refetch } = useQuery(controlPointsQuery);
  const lane = useLane(roverId);
  const { role } = useMe();
  if (error && !data) return <Failed error={error} retry={() => void refetch()} />;
  if (!data) return <Loading what="the control points" />;
  const home = role === 'crewChief' ? '/my-crew' : `/rovers/${roverId}`;
  const points = nearestPoints(data, lane);
  return (
    <div className="set-up">
      <p>
        <Link to={home}>{role === 'crewChief' ? 'My crew' : 'The rover'}</Link>
      </p>
      <h1>Check into control</h1>
      {points.length === 0 ? (
        <Empty title="No control point yet">
          The office enters them under Control points, one by one or as a list.
        </Empty>
      ) : (
        <CheckShot key={roverId} roverId={roverId} points={points} home={home} />
      )}
      <p className="caution">
        A fixed solution can be wrong: check before and during work, and repeat important points after
        re-initialising. The licensed surveyor in charge, and local rules, decide what is acceptable.
      </p>
    </div>
  );
}

interface CheckShotProps {
  roverId: number;
  points: ReturnType<typeof nearestPoints>;
  home: string;
}

function CheckShot({ roverId, points, home }: CheckShotProps) {
  const preview = usePreviewCheckShot();
  const add = useAddCheckShot();
  const [seen, setSeen] = useState<{ body: CheckShotBody; result: CheckShotResult } | null>(null);
  const [kept, setKept] = useState<CheckShot | null>(null);
  const look = async (body: CheckShotBody) => {
    setKept(null);
    setSeen(null);
    setSeen({ body, result: await preview.mutateAsync(body) });
  };
  const keep = async () => {
    if (seen) setKept(await add.mutateAsync(seen.body).catch(() => null));
  };
  return (
    <>
      <ShotForm roverId={roverId} points={points} look={look} />
      {seen && (
        <section aria-label="The check" className="set-up-result">
          {/* A mean is taken anew when it is kept: what is kept is what is shown then. */}
          <ShotResult result={kept ?? seen.result} />
          {kept ? (
            <p role="status">
              Kept. <Link to={home}>{home === '/my-crew' ? 'My crew' : 'The rover'}</Link>
            </p>
          ) : (
            <Button
              appearance="primary"
              className="set-up-keep"
              disabled={add.isPending}
              onClick={() => void keep()}
            >
              Keep this check
            </Button>
          )}
          {add.error && <p role="alert">{add.error.message}</p>}
        </section>
      )}
    </>
  );
}
