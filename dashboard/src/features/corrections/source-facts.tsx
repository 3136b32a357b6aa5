import {
  correctionFormatLabels,
  type CorrectionSource,
} from '@hubtack/contracts/corrections/correction-source.js';
import type { ReactNode } from 'react';
import { dayAndTime, utc } from '../../lib/format';
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
    </dl>
  );
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
