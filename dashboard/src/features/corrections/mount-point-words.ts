import type { MountPoint } from '@hubtack/contracts/corrections/mount-point.js';
import { authenticationWords } from './mount-point-list';

const known = (words: (string | null | false)[]): string => words.filter(Boolean).join(', ');

/** Town, country and network, as far as the table names them. */
export const whereWords = ({ identifier, country, network }: MountPoint): string =>
  known([identifier, country, network]);

/** What it asks of who uses it. */
export const termsWords = ({ authentication, wantsPosition, fee, isNetwork }: MountPoint): string =>
  known([
    authentication && authenticationWords[authentication],
    wantsPosition && 'wants the position',
    isNetwork && 'computed by a network',
    fee && 'for a fee',
  ]) || '–';
