import { flagLabels, type FlagWord } from '@hubtack/contracts/lost-fixes/lost-fix.js';
import { useState } from 'react';
import { z } from 'zod';
import { Form } from '../../components/form';
import { NoteField } from '../../components/form-fields';
import { Sheet } from '../../components/sheet';
import { flagWords } from '../../lib/flags';
import { PhotoPicker } from './photo-picker';
import { useTapping } from './use-tapping';
import { WordChoice } from './word-choice';
import './flag-sheet.css';

const said = z.object({
  word: z.enum(flagWords.shape.word.options, 'Choose what you see'),
  note: flagWords.shape.note,
});

interface FlagSheetProps {
  crewId: number;
  roverId: number;
  /** Null: the chief chooses. */
  word: FlagWord | null;
  onClose: () => void;
}

/** What the chief sees, in the own words. Closes as soon as the phone has it; the signal may come later. */
export function FlagSheet({ crewId, roverId, word, onClose }: FlagSheetProps) {
  const { flag } = useTapping(crewId);
  const [photos, setPhotos] = useState<readonly Blob[]>([]);
  return (
    <Sheet title={word === null ? 'We lost the fix' : flagLabels[word]} onClose={onClose}>
      <div className="my-crew-sheet">
        <Form
          schema={said}
          defaults={{ word: word ?? undefined, note: null }}
          button="Tell the office"
          submit={async (body) => {
            await flag({ roverId, ...body }, photos);
            onClose();
          }}
        >
          {word === null && <WordChoice name="word" />}
          <NoteField name="note" label="Note (may be left empty)" />
          <PhotoPicker photos={photos} onChange={setPhotos} />
        </Form>
      </div>
    </Sheet>
  );
}
