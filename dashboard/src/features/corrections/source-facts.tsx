import {
  correctionFormatLabels,
  type CorrectionSource,
} from '@hubtack/contracts/corrections/correction-source.js';
import { useQuery } from '@tanstack/react-query';
import { Fragment, type ReactNode } from 'react';
import { Link } from 'react-router-dom';
import { dayAndTime, utc } from '../../lib/format';
import { roversQuery } from '../../lib/rovers';
import { useMe } from '../../lib/session';
import { degrees, fineLength } from './base-words';
import { watchWords } from './watch-words';

const Fact = ({ name, children }: { name: string; children: ReactNode }) => (
  <div>
    <dt>{name}</dt>
    <dd>{children}</dd>
  </div>
);

const loginWords = ({ user, hasPassword }: CorrectionSource): string => {
  if (user === null) return hasPassword ? 'a password without a user' : 'none';
  return `${user}, ${hasPassword ? 'password kept' : 'no password'}`;
};

/** What is set, in the words of the form. */
export function SourceFacts({ source }: { source: CorrectionSource }) {
  return (
    <dl className="facts">
      <Fact name="Mount point">
        <strong>{source.mountPoint}</strong>
      </Fact>
      <Fact name="Address">
        {source.address}, port {source.port}
      </Fact>
      <Fact name="Login">{loginWords(source)}</Fact>
      <Fact name="Connection">
        NTRIP {source.ntripVersion}, {source.tls ? 'encrypted (TLS)' : 'in the clear'}
      </Fact>
      <Fact name="Rover’s position">{source.sendPosition ? 'is sent' : 'is not sent'}</Fact>
      <Fact name="Format expected">{correctionFormatLabels[source.expectedFormat]}</Fact>
      <Fact name="Watch">{watchWords(source.watchMinutes)}</Fact>
      <Fact name="Base position">
        <BasePosition source={source} />
      </Fact>
      <Fact name="Rovers on it">
        <RoversOn source={source} />
      </Fact>
    </dl>
  );
}

/** Whom a change here concerns: each of them is set to the same by hand. */
function RoversOn({ source }: { source: CorrectionSource }) {
  const { data: rovers = [] } = useQuery(roversQuery);
  const mine = rovers.filter((rover) => rover.correctionSourceId === source.id && !rover.retired);
  if (mine.length === 0) return <>none</>;
  return mine.map(({ id, label }, index) => (
    <Fragment key={id}>
      {index > 0 && ', '}
      <Link to={`/rovers/${id}`}>{label}</Link>
    </Fragment>
  ));
}

function BasePosition({
  source: { decodedBase, baseLatitude, baseLongitude },
}: {
  source: CorrectionSource;
}) {
  const { timeZone, units } = useMe();
  if (decodedBase) {
    const at = Date.parse(decodedBase.at);
    return (
      <>
        {degrees(decodedBase.latitude, decodedBase.longitude)}, {fineLength(decodedBase.heightM, units)}{' '}
        <small title={utc(at)}>
          station {decodedBase.stationId}, read from the stream {dayAndTime(at, timeZone)}
        </small>
      </>
    );
  }
  if (baseLatitude === null || baseLongitude === null) return <>not known</>;
  return (
    <>
      {degrees(baseLatitude, baseLongitude)} <small>as written by hand</small>
    </>
  );
}
