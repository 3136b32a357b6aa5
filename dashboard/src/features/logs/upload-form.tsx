import {
  Button,
  Field,
  Input,
  MessageBar,
  MessageBarBody,
  ProgressBar,
  Select,
} from '@fluentui/react-components';
import { MAX_LOG_BYTES } from '@hubtack/contracts/logs/log.js';
import { useQuery } from '@tanstack/react-query';
import { useRef, useState, type DragEvent } from 'react';
import { useNavigate } from 'react-router-dom';
import { useUploadLog } from '../../lib/logs';
import { roversQuery } from '../../lib/rovers';
import { size } from './log-words';

interface Sending {
  sent: number;
  cancel: AbortController;
}

/** Chooses a log, says what it is for, and sends it. What was chosen stays when something goes wrong. */
export function UploadForm() {
  const navigate = useNavigate();
  const upload = useUploadLog();
  const rovers = useQuery(roversQuery).data ?? [];
  const chooser = useRef<HTMLInputElement>(null);
  const [file, setFile] = useState<File | null>(null);
  const [date, setDate] = useState('');
  const [roverId, setRoverId] = useState('');
  const [sending, setSending] = useState<Sending | null>(null);
  const [isOver, setIsOver] = useState(false);

  const choose = (chosen: File | undefined) => {
    if (!chosen) return;
    upload.reset();
    setFile(chosen);
  };
  const drop = (event: DragEvent) => {
    event.preventDefault();
    setIsOver(false);
    choose(event.dataTransfer.files[0]);
  };
  const isTooLarge = file !== null && file.size > MAX_LOG_BYTES;
  const fileFault =
    file === null
      ? null
      : isTooLarge
        ? `${file.name} has ${size(file.size)}: at most ${size(MAX_LOG_BYTES)}. Cut it in two.`
        : file.size === 0
          ? `${file.name} is empty.`
          : null;

  const send = async () => {
    if (!file) return;
    const cancel = new AbortController();
    setSending({ sent: 0, cancel });
    try {
      const { id } = await upload.mutateAsync({
        file,
        date: date === '' ? null : date,
        roverId: roverId === '' ? null : Number(roverId),
        signal: cancel.signal,
        onProgress: (sent) => setSending({ sent, cancel }),
      });
      void navigate(`/logs/${id}`);
    } catch {
      // Said beside the button; nothing that was chosen is lost.
      setSending(null);
    }
  };
  const isCancelled = upload.error?.name === 'AbortError';

  return (
    <form
      className="log-upload"
      aria-label="A log to be read"
      onSubmit={(event) => {
        event.preventDefault();
        void send();
      }}
    >
      <div
        className="log-drop"
        data-over={isOver}
        onDragOver={(event) => {
          event.preventDefault();
          setIsOver(true);
        }}
        onDragLeave={() => setIsOver(false)}
        onDrop={drop}
      >
        <input
          ref={chooser}
          type="file"
          className="log-file"
          aria-label="Log of a receiver"
          tabIndex={-1}
          onChange={(event) => {
            choose(event.target.files?.[0]);
            event.target.value = '';
          }}
        />
        <Button onClick={() => chooser.current?.click()} disabled={sending !== null}>
          Choose a file
        </Button>
        <span>
          {file ? (
            <>
              <strong>{file.name}</strong> {size(file.size)}
            </>
          ) : (
            `or drop it here: NMEA sentences, one a line, up to ${size(MAX_LOG_BYTES)}`
          )}
        </span>
      </div>
      {fileFault && <p className="log-fault">{fileFault}</p>}
      <div className="form-row">
        <Field
          label="UTC date of its first sentence"
          hint="GGA has a time and no date. Leave it empty when the log has RMC or ZDA."
        >
          <Input type="date" value={date} onChange={(_, { value }) => setDate(value)} />
        </Field>
        <Field
          label="Add it to the history of"
          hint="Its epochs then count in that rover’s figures, as sentences that come late."
        >
          <Select value={roverId} onChange={(_, { value }) => setRoverId(value)}>
            <option value="">no rover: look at it only</option>
            {rovers.map(({ id, label }) => (
              <option key={id} value={id}>
                {label}
              </option>
            ))}
          </Select>
        </Field>
      </div>
      {upload.error && !isCancelled && (
        <MessageBar intent="error">
          <MessageBarBody>{upload.error.message}</MessageBarBody>
        </MessageBar>
      )}
      {isCancelled && <p role="status">Cancelled. Nothing was kept.</p>}
      {sending && file ? (
        <div className="log-sending">
          <Field
            validationMessage={`${size(sending.sent)} of ${size(file.size)} sent`}
            validationState="none"
          >
            <ProgressBar value={file.size === 0 ? 0 : Math.min(1, sending.sent / file.size)} />
          </Field>
          <Button onClick={() => sending.cancel.abort()}>Cancel</Button>
        </div>
      ) : (
        <div className="form-buttons">
          <Button type="submit" appearance="primary" disabled={file === null || fileFault !== null}>
            Read it
          </Button>
        </div>
      )}
    </form>
  );
}
