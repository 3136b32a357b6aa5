import { useWindowVirtualizer } from '@tanstack/react-virtual';
import { useLayoutEffect, useRef, useState, type KeyboardEvent } from 'react';
import { LaneRow } from './lane-row';

interface LaneListProps {
  order: readonly number[];
  openId: number | null;
  onOpen: ((id: number) => void) | null;
}

const ROW_PX = 66;
/** Arrow keys go from lane to lane, also to one that is not drawn yet. */
const columns = ['', 'Crew', 'State', 'Last hour', 'Satellites', 'Age', 'HDOP', 'Base', 'Site', 'Today'];

/** All lanes, of which only those in sight are drawn. */
export function LaneList({ order, openId, onOpen }: LaneListProps) {
  const list = useRef<HTMLDivElement>(null);
  const [top, setTop] = useState(0);
  useLayoutEffect(() => setTop(list.current?.offsetTop ?? 0), []);
  const rows = useWindowVirtualizer({
    count: order.length,
    estimateSize: () => ROW_PX,
    overscan: 6,
    scrollMargin: top,
    getItemKey: (index) => order[index]!,
  });
  const move = (event: KeyboardEvent) => {
    if (event.key !== 'ArrowDown' && event.key !== 'ArrowUp') return;
    const current = Number((event.target as HTMLElement).dataset.lane);
    const index = order.indexOf(current);
    const next = order[index + (event.key === 'ArrowDown' ? 1 : -1)];
    if (index < 0 || next === undefined) return;
    event.preventDefault();
    rows.scrollToIndex(order.indexOf(next));
    requestAnimationFrame(() => list.current?.querySelector<HTMLElement>(`[data-lane="${next}"]`)?.focus());
  };
  return (
    <div className="lanes" role="table" aria-label="Crews by need" aria-rowcount={order.length + 1}>
      <div role="rowgroup">
        <div className="lane lane-head" role="row">
          {columns.map((name) => (
            <span key={name} role="columnheader">
              {name || <span className="visually-hidden">Shape</span>}
            </span>
          ))}
        </div>
      </div>
      <div
        ref={list}
        role="rowgroup"
        className="lanes-body"
        style={{ height: rows.getTotalSize() }}
        onKeyDown={move}
      >
        {rows.getVirtualItems().map((item) => (
          <div
            key={item.key}
            role="presentation"
            ref={rows.measureElement}
            data-index={item.index}
            className="lanes-place"
            style={{ transform: `translateY(${item.start - top}px)` }}
          >
            <LaneRow id={order[item.index]!} isOpen={order[item.index] === openId} onOpen={onOpen} />
          </div>
        ))}
      </div>
    </div>
  );
}
