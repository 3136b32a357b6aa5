import { Button } from '@fluentui/react-components';
import type { Photo } from '@hubtack/contracts/lost-fixes/lost-fix.js';
import { useState, type KeyboardEvent } from 'react';
import { Sheet } from '../../components/sheet';
import { clockTime } from '../../lib/format';
import { useMe } from '../../lib/session';

const source = (lostFixId: number, id: number) => `/api/lost-fixes/${lostFixId}/photos/${id}`;

/** What the chief has photographed; one at a time in full, arrow keys from one to the next. */
export function PhotoStrip({ lostFixId, photos }: { lostFixId: number; photos: readonly Photo[] }) {
  const { timeZone } = useMe();
  const [shown, setShown] = useState<number | null>(null);
  if (photos.length === 0) return null;
  const step = (by: number) =>
    setShown((at) => (at === null ? at : Math.min(Math.max(at + by, 0), photos.length - 1)));
  const onKeyDown = (event: KeyboardEvent) => {
    if (event.key === 'ArrowRight') step(1);
    if (event.key === 'ArrowLeft') step(-1);
  };
  const photo = shown === null ? undefined : photos[shown];
  const words = ({ at, by }: Photo) => `Photo by ${by}, ${clockTime(at, timeZone)}`;
  return (
    <section aria-label="Photos">
      <h2>Photos</h2>
      <div className="photo-strip">
        {photos.map((one, index) => (
          <button key={one.id} type="button" onClick={() => setShown(index)}>
            <img src={source(lostFixId, one.id)} alt={words(one)} loading="lazy" />
          </button>
        ))}
      </div>
      {photo && (
        <Sheet title={`${(shown ?? 0) + 1} of ${photos.length}`} onClose={() => setShown(null)}>
          <div className="photo-full" onKeyDown={onKeyDown} role="presentation">
            <img
              src={source(lostFixId, photo.id)}
              alt={words(photo)}
              width={photo.width}
              height={photo.height}
            />
            <p>{words(photo)}</p>
            <div className="lost-fix-actions">
              <Button disabled={shown === 0} onClick={() => step(-1)}>
                Before
              </Button>
              <Button disabled={shown === photos.length - 1} onClick={() => step(1)}>
                Next
              </Button>
            </div>
          </div>
        </Sheet>
      )}
    </section>
  );
}
