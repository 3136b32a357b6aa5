import type { SourceTable } from '../ntrip/source-table.js';

const counted = (count: number, name: string): string => `${count} ${name}${count === 1 ? '' : 's'}`;
/** How many records of each kind a source table has. */
export const tableWords = ({ STR, CAS, NET }: SourceTable['records']): string =>
  `${counted(STR, 'mount point')}, ${counted(CAS, 'caster')}, ${counted(NET, 'network')}.`;
