import { Button } from '@fluentui/react-components';
import { useEffect, type RefObject } from 'react';

interface BoardKeysProps {
  search: RefObject<HTMLInputElement | null>;
  onEscape: () => void;
}

const SHEET = 'board-keys';
const isTyping = (target: EventTarget | null): boolean =>
  target instanceof HTMLElement && target.matches('input, textarea, select');

const keys = [
  ['/', 'Search'],
  ['↑ ↓', 'From lane to lane'],
  ['Enter', 'Open or close the lane'],
  ['← →', 'Along a ribbon'],
  ['Esc', 'Close the panel'],
  ['?', 'These keys'],
] as const;

/** The board's keys, and the sheet that lists them. */
export function BoardKeys({ search, onEscape }: BoardKeysProps) {
  useEffect(() => {
    const press = (event: KeyboardEvent) => {
      if (event.key === 'Escape') return onEscape();
      if (isTyping(event.target) || event.ctrlKey || event.metaKey || event.altKey) return undefined;
      if (event.key === '/') {
        event.preventDefault();
        search.current?.focus();
      }
      if (event.key === '?') document.getElementById(SHEET)?.togglePopover();
      return undefined;
    };
    addEventListener('keydown', press);
    return () => removeEventListener('keydown', press);
  }, [search, onEscape]);
  return (
    <>
      <Button
        aria-label="Keys"
        title="Keys (?)"
        onClick={() => document.getElementById(SHEET)?.togglePopover()}
      >
        ?
      </Button>
      <div id={SHEET} popover="auto" className="keys-sheet">
        <h2>Keys</h2>
        <dl>
          {keys.map(([key, words]) => (
            <div key={key}>
              <dt>
                <kbd>{key}</kbd>
              </dt>
              <dd>{words}</dd>
            </div>
          ))}
        </dl>
      </div>
    </>
  );
}
