import type { LostFix } from '@hubtack/contracts/lost-fixes/lost-fix.js';

export type BoardRow = { kind: 'lane'; id: number } | { kind: 'block'; id: number };

/**
 * Lanes in their order, those under one mount point's lost fix together under its block, at the place of the first of
 * them. A block whose lanes have lost no fix yet stands on top: it will be needed first.
 */
export function withBlocks(order: readonly number[], lostFixes: ReadonlyMap<number, LostFix>): BoardRow[] {
  const blockOf = new Map<number, number>();
  for (const { roverId, sharedId } of lostFixes.values())
    if (roverId !== null && sharedId !== null && lostFixes.has(sharedId)) blockOf.set(roverId, sharedId);
  const placed = new Set<number>();
  const rows: BoardRow[] = [];
  for (const id of order) {
    const block = blockOf.get(id);
    if (block === undefined) rows.push({ kind: 'lane', id });
    else if (!placed.has(block)) {
      placed.add(block);
      rows.push({ kind: 'block', id: block });
      for (const member of order) if (blockOf.get(member) === block) rows.push({ kind: 'lane', id: member });
    }
  }
  const alone = [...lostFixes.values()].filter(({ kind, id }) => kind === 'mountPoint' && !placed.has(id));
  return [...alone.map(({ id }): BoardRow => ({ kind: 'block', id })), ...rows];
}
