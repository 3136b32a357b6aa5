import type { CheckedBase } from '@hubtack/contracts/corrections/check.js';
import { distance } from '../../lib/format';
import { useMe } from '../../lib/session';
import { baseAlarms, degrees, expectedWords, fineLength } from './base-words';

/** A base that is another one, or stands elsewhere, before anything else about the check. */
export function BaseAlarms({ base }: { base: CheckedBase }) {
  const { units } = useMe();
  const alarms = baseAlarms(base, units);
  if (alarms.length === 0) return null;
  return (
    <div className="base-alarm" role="alert">
      {alarms.map((alarm) => (
        <p key={alarm}>
          <strong>{alarm}</strong>
        </p>
      ))}
      <p>
        Every point taken from it moves along. Ask the operator, and check into known control before anything
        is measured.
      </p>
    </div>
  );
}

/** Where the base is by its own message, how far from the work, and what can be expected at that distance. */
export function BaseFigures({ base, place }: { base: CheckedBase; place: string | null }) {
  const { units } = useMe();
  const expected = expectedWords(base, units);
  return (
    <section className="check-part" aria-label="The base">
      <h3>The base</h3>
      <dl className="facts">
        <div>
          <dt>Station</dt>
          <dd>
            {base.stationId}
            {base.isVirtual && ', computed by the network'}
          </dd>
        </div>
        <div>
          <dt>Position in the stream</dt>
          <dd>{degrees(base.latitude, base.longitude)}</dd>
        </div>
        <div>
          <dt>Height above the ellipsoid</dt>
          <dd>{fineLength(base.heightM, units)}</dd>
        </div>
        {base.antennaHeightM !== null && (
          <div>
            <dt>Antenna height</dt>
            <dd>{fineLength(base.antennaHeightM, units)}</dd>
          </div>
        )}
        {base.distanceM !== null && (
          <div>
            <dt>Base distance{place !== null && ` to ${place}`}</dt>
            <dd>
              <strong>{distance(base.distanceM, units)}</strong>
            </dd>
          </div>
        )}
        {expected !== null && (
          <div>
            <dt>To be expected there</dt>
            <dd>{expected}</dd>
          </div>
        )}
      </dl>
      <p className="source-note">
        {base.isVirtual
          ? 'A virtual base is made near the rover: its distance says little about quality.'
          : base.distanceM === null
            ? 'Choose a site or a rover before the check, and it says how far the base is and what can be expected there.'
            : 'Expected: 8 mm + 1 ppm horizontal and 15 mm + 1 ppm vertical up to about 30 km, common practice under an open sky; no promise.'}
      </p>
    </section>
  );
}
