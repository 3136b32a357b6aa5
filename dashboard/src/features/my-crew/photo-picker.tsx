import { Button } from '@fluentui/react-components';
import { MAX_PHOTOS } from '@hubtack/contracts/lost-fixes/lost-fix.js';
import { useEffect, useMemo, useRef, useState } from 'react';
import { shrinkPhoto } from './shrink-photo';

function Thumbnail({ photo, index, onRemove }: { photo: Blob; index: number; onRemove: () => void }) {
  const url = useMemo(() => URL.createObjectURL(photo), [photo]);
  useEffect(() => () => URL.revokeObjectURL(url), [url]);
  return (
    <li>
      <img src={url} alt={`To be sent, ${index + 1}`} />
      <Button onClick={onRemove} aria-label={`Leave out photo ${index + 1}`}>
        Leave out
      </Button>
    </li>
  );
}

interface PhotoPickerProps {
  photos: readonly Blob[];
  onChange: (photos: readonly Blob[]) => void;
}

/** Up to four photos, from the camera or the phone's own. */
export function PhotoPicker({ photos, onChange }: PhotoPickerProps) {
  const input = useRef<HTMLInputElement>(null);
  const [problem, setProblem] = useState<string | null>(null);
  const room = MAX_PHOTOS - photos.length;
  const take = async (files: readonly File[]) => {
    setProblem(files.length > room ? `At most ${MAX_PHOTOS} photos; the first ones were taken.` : null);
    const taken: Blob[] = [];
    for (const file of files.slice(0, room)) {
      try {
        taken.push(await shrinkPhoto(file));
      } catch (error) {
        setProblem((error as Error).message);
      }
    }
    onChange([...photos, ...taken]);
  };
  return (
    <div className="photo-picker">
      <input
        ref={input}
        type="file"
        accept="image/*"
        multiple
        hidden
        aria-label="Photos"
        onChange={({ target }) => {
          const files = [...(target.files ?? [])];
          // The same file may be chosen again after it was left out.
          target.value = '';
          void take(files);
        }}
      />
      <Button disabled={room === 0} onClick={() => input.current?.click()}>
        {photos.length === 0 ? 'Add photos' : `Add photos (${photos.length} of ${MAX_PHOTOS})`}
      </Button>
      {problem && <p role="alert">{problem}</p>}
      {photos.length > 0 && (
        <ul>
          {photos.map((photo, index) => (
            <Thumbnail
              // Photos have no name of their own, and only ever leave or join at the end.
              key={`${photo.size} ${index}`}
              photo={photo}
              index={index}
              onRemove={() => onChange(photos.filter((other) => other !== photo))}
            />
          ))}
        </ul>
      )}
    </div>
  );
}
