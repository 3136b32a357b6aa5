import { Button } from '@fluentui/react-components';
import { useEffect, useRef, type ReactNode } from 'react';
import './sheet.css';

/** A form or a question over the page: the browser's own dialog, which keeps the focus and closes on Escape. */
export function Sheet({
  title,
  onClose,
  children,
}: {
  title: string;
  onClose: () => void;
  children: ReactNode;
}) {
  const dialog = useRef<HTMLDialogElement>(null);
  useEffect(() => {
    const shown = dialog.current;
    shown?.showModal();
    return () => shown?.close();
  }, []);
  return (
    <dialog
      ref={dialog}
      className="sheet"
      aria-label={title}
      onCancel={(event) => {
        event.preventDefault();
        onClose();
      }}
    >
      <header>
        <h2>{title}</h2>
        <Button appearance="subtle" onClick={onClose}>
          Close
        </Button>
      </header>
      {children}
    </dialog>
  );
}
