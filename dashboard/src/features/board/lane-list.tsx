import { useWindowVirtualizer } from '@tanstack/react-virtual';
import { useLayoutEffect, useMemo, useRef, useState, type KeyboardEvent } from 'react';
import { useOpenLostFixes } from '../../live/use-lanes';
import { BlockRow } from './block-row';
import { withBlocks, type BoardRow as Row } from './blocks';
import { LaneRow } from './lane-row';

interface LaneListProps {
  order: readonly number[];
  openId: number | null;
  onOpen: ((id: number) => void) | null;
}

const ROW_PX = 66;
/** Arrow keys go from lane to lane, also to one that is not drawn yet. */
const columns = ['', 'Crew', 'State', 'Last hour', 'Satellites', 'Age', 'HDOP', 'Base', 'Site', 'Today'];

function BoardRow({
  row,
  openId,
  onOpen,
}: {
  row: Row;
  openId: number | null;
  onOpen: LaneListProps['onOpen'];
}) {
  if (row.kind === 'block') return <BlockRow id={row.id} canAct={onOpen !== null} />;
  return <LaneRow id={row.id} isOpen={row.id === openId} onOpen={onOpen} />;
}

/** All lanes, of which only those in sight are drawn. */
export function LaneList({ order, openId, onOpen }: LaneListProps) {
  const list = useRef<HTMLDivElement>(null);
  const [top, setTop] = useState(0);
  useLayoutEffect(() => setTop(list.current?.offsetTop ?? 0), []);
  const lostFixes = useOpenLostFixes();
  const all = useMemo(() => withBlocks(order, lostFixes), [order, lostFixes]);
  const rows = useWindowVirtualizer({
    count: all.length,
    estimateSize: () => ROW_PX,
    overscan: 6,
    scrollMargin: top,
    getItemKey: (index) => `${all[index]!.kind} ${all[index]!.id}`,
  });
  const move = (event: KeyboardEvent) => {
    if (event.key !== 'ArrowDown' && event.key !== 'ArrowUp') return;
    const current = Number((event.target as HTMLElement).dataset.lane);
    const index = order.indexOf(current);
    const next = order[index + (event.key === 'ArrowDown' ? 1 : -1)];
    if (index < 0 || next === undefined) return;
    event.preventDefault();
    rows.scrollToIndex(all.findIndex(({ kind, id }) => kind === 'lane' && id === next));
    requestAnimationFrame(() => list.current?.querySelector<HTMLElement>(`[data-lane="${next}"]`)?.focus());
  };
  return (
    <div className="lanes" role="table" aria-label="Crews by need" aria-rowcount={all.length + 1}>
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
            <BoardRow row={all[item.index]!} openId={openId} onOpen={onOpen} />
          </div>
        ))}
      </div>
    </div>
  );
}
