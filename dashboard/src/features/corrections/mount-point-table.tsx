import { Button } from '@fluentui/react-components';
import type { MountPoint } from '@hubtack/contracts/corrections/mount-point.js';
import { useWindowVirtualizer } from '@tanstack/react-virtual';
import { memo, useLayoutEffect, useRef, useState } from 'react';
import { distance } from '../../lib/format';
import { useMe } from '../../lib/session';
import { termsWords, whereWords } from './mount-point-words';

const ROW_PX = 62;
const columns = ['Mount point', 'Format and messages', 'Systems', 'Distance', 'Terms', 'Choose'];

interface MountPointTableProps {
  mountPoints: readonly MountPoint[];
  /** The one that the source has now. */
  current: string;
  onChoose: ((chosen: MountPoint) => void) | null;
}

/** All streams of a caster, of which only those in sight are drawn: some casters have several hundred. */
export function MountPointTable({ mountPoints, current, onChoose }: MountPointTableProps) {
  const list = useRef<HTMLDivElement>(null);
  const [top, setTop] = useState(0);
  useLayoutEffect(() => setTop(list.current?.offsetTop ?? 0), []);
  const rows = useWindowVirtualizer({
    count: mountPoints.length,
    estimateSize: () => ROW_PX,
    overscan: 8,
    scrollMargin: top,
    // A table may name a mount point twice.
    getItemKey: (index) => `${mountPoints[index]!.mountPoint} ${index}`,
  });
  return (
    <div
      className="mount-points"
      role="table"
      aria-label="Mount points"
      aria-rowcount={mountPoints.length + 1}
    >
      <div role="rowgroup">
        <div className="mount-point mount-point-head" role="row" aria-rowindex={1}>
          {columns.map((name) => (
            <span key={name} role="columnheader">
              {name}
            </span>
          ))}
        </div>
      </div>
      <div ref={list} role="rowgroup" className="mount-points-body" style={{ height: rows.getTotalSize() }}>
        {rows.getVirtualItems().map((item) => (
          <div
            key={item.key}
            role="presentation"
            ref={rows.measureElement}
            data-index={item.index}
            className="mount-points-place"
            style={{ transform: `translateY(${item.start - top}px)` }}
          >
            <Row
              mountPoint={mountPoints[item.index]!}
              index={item.index}
              isCurrent={mountPoints[item.index]!.mountPoint === current}
              onChoose={onChoose}
            />
          </div>
        ))}
      </div>
    </div>
  );
}

interface RowProps {
  mountPoint: MountPoint;
  index: number;
  isCurrent: boolean;
  onChoose: MountPointTableProps['onChoose'];
}

const Row = memo(function Row({ mountPoint: one, index, isCurrent, onChoose }: RowProps) {
  const { units } = useMe();
  return (
    <div className="mount-point" role="row" aria-rowindex={index + 2} data-current={isCurrent}>
      <span role="cell">
        <strong>{one.mountPoint}</strong>
        <small>{whereWords(one)}</small>
      </span>
      <span role="cell">
        {one.format ?? '–'}
        <small>{one.formatDetails?.replaceAll(',', ', ')}</small>
      </span>
      <span role="cell">{one.constellations?.replaceAll('+', ' + ') ?? '–'}</span>
      <span role="cell" className="mount-point-figure">
        {one.distanceM === null ? '–' : distance(one.distanceM, units)}
      </span>
      <span role="cell">{termsWords(one)}</span>
      <span role="cell">
        {isCurrent && <span>in use</span>}
        {!isCurrent && onChoose && (
          <Button size="small" onClick={() => onChoose(one)} aria-label={`Choose ${one.mountPoint}`}>
            Choose
          </Button>
        )}
      </span>
    </div>
  );
});
