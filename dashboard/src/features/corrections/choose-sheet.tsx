import { Button, Checkbox, MessageBar, MessageBarBody } from '@fluentui/react-components';
import type { CorrectionSource } from '@hubtack/contracts/corrections/correction-source.js';
import type { MountPoint } from '@hubtack/contracts/corrections/mount-point.js';
import { useState } from 'react';
import '../../components/form.css';
import { Sheet } from '../../components/sheet';
import { useChangeCorrectionSource } from '../../lib/corrections';
import { changesFor, doubtsAbout } from './choose';
import { bodyOf } from './source-body';

interface ChooseSheetProps {
  source: CorrectionSource;
  chosen: MountPoint;
  onClose: () => void;
  onChosen: () => void;
}

/** What would change in the source is shown before it does; each can be left as it is. */
export function ChooseSheet({ source, chosen, onClose, onChosen }: ChooseSheetProps) {
  const change = useChangeCorrectionSource(source.id);
  const [left, setLeft] = useState<ReadonlySet<string>>(new Set());
  const changes = changesFor(source, chosen);
  const doubts = doubtsAbout(source, chosen);
  const toDo = changes.filter(({ field }) => !left.has(field));
  const flip = (field: string) =>
    setLeft((before) => {
      const next = new Set(before);
      if (!next.delete(field)) next.add(field);
      return next;
    });
  const save = () =>
    change.mutate(Object.assign(bodyOf(source), ...toDo.map(({ body }) => body)), { onSuccess: onChosen });
  return (
    <Sheet title={`Take ${chosen.mountPoint} into ${source.name}?`} onClose={onClose}>
      <div className="form">
        <ul className="choose-changes">
          {changes.map(({ field, name, before, after }) => (
            <li key={field}>
              <Checkbox
                label={
                  <>
                    <strong>{name}</strong>: {before} becomes <strong>{after}</strong>
                  </>
                }
                checked={!left.has(field)}
                onChange={() => flip(field)}
              />
            </li>
          ))}
        </ul>
        {changes.length === 0 && (
          <p className="source-note">Nothing would change: all of it is so already.</p>
        )}
        {doubts.map((doubt) => (
          <p key={doubt} className="check-warning">
            {doubt}
          </p>
        ))}
        <p className="source-note">
          Rovers that use this source are to be set to the same; nothing does that for them.
        </p>
        {change.error && (
          <MessageBar intent="error" layout="multiline">
            <MessageBarBody>{change.error.message}</MessageBarBody>
          </MessageBar>
        )}
        <div className="form-buttons">
          <Button appearance="primary" disabled={toDo.length === 0 || change.isPending} onClick={save}>
            Change the source
          </Button>
          <Button onClick={onClose}>Cancel</Button>
        </div>
      </div>
    </Sheet>
  );
}
