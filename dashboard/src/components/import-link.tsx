import type { ImportKind } from '@hubtack/contracts/imports/import.js';
import { Link } from 'react-router-dom';

/** The way from a list to importing more of it. */
export const ImportLink = ({ kind }: { kind: ImportKind }) => (
  <Link to={`/imports/${kind}`}>Import from a spreadsheet</Link>
);
