import type { MountPoint } from '@hubtack/contracts/corrections/mount-point.js';
import { describe, expect, it } from 'vitest';
import { filterMountPoints, formatsOf, noFilter, sortMountPoints } from './mount-point-list';
import { makeMountPoint } from '../../testing/make-mount-point';

const names = (list: readonly MountPoint[]) => list.map(({ mountPoint }) => mountPoint);
const list = [
  makeMountPoint('QUARB2', { identifier: 'Quarry Bend', distanceM: 8400, format: 'RTCM 3.2' }),
  makeMountPoint('TANF00', { identifier: 'Tannery Flats', distanceM: 900, authentication: 'basic' }),
  makeMountPoint('BASE10', { distanceM: null, format: 'RTCM 2.3', network: 'Old' }),
  makeMountPoint('BASE2', { distanceM: null, network: 'New' }),
];

describe('a list of mount points', () => {
  it('by distance, those of unknown place last and by name, figures as figures', () => {
    expect(names(sortMountPoints(list, 'distance'))).toEqual(['TANF00', 'QUARB2', 'BASE2', 'BASE10']);
  });
  it('by name and by network', () => {
    expect(names(sortMountPoints(list, 'name'))).toEqual(['BASE2', 'BASE10', 'QUARB2', 'TANF00']);
    expect(names(sortMountPoints(list, 'network')).slice(0, 2)).toEqual(['BASE2', 'BASE10']);
  });
  it('every word that is looked for must be somewhere', () => {
    expect(names(filterMountPoints(list, { ...noFilter, text: 'flats tan' }))).toEqual(['TANF00']);
    expect(filterMountPoints(list, { ...noFilter, text: 'flats quarry' })).toEqual([]);
  });
  it('by format and by login', () => {
    expect(names(filterMountPoints(list, { ...noFilter, format: 'RTCM 2.3' }))).toEqual(['BASE10']);
    expect(names(filterMountPoints(list, { ...noFilter, authentication: 'basic' }))).toEqual(['TANF00']);
  });
  it('names the formats that there are, the most frequent first', () => {
    expect(formatsOf(list)).toEqual(['RTCM 3.2', 'RTCM 2.3']);
  });
});
