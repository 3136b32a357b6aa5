import type { LostFixDetail } from '@hubtack/contracts/lost-fixes/lost-fix.js';
import { distance } from '../../lib/format';
import { useMe } from '../../lib/session';

/** Mount points by distance: where a crew could take its corrections from instead. */
export function NearestList({ lostFix: { nearest } }: { lostFix: LostFixDetail }) {
  const { units } = useMe();
  if (nearest.length === 0) return null;
  return (
    <section aria-label="Mount points near by">
      <h2>Mount points near by</h2>
      <ul className="plain-list">
        {nearest.map(({ mountPoint, name, distanceM, isOwn, isInRange }) => (
          <li key={`${mountPoint} ${name}`}>
            <strong>{mountPoint}</strong> {distance(distanceM, units)}, {isInRange ? 'in range' : 'too far'}
            {isOwn && ', the rover’s own'} <small>{name}</small>
          </li>
        ))}
      </ul>
      <p>
        <small>
          From the rover’s newest position, or its site. A network mount point with a virtual base has no
          distance.
        </small>
      </p>
    </section>
  );
}
