import type { ViewerRole } from '@hubtack/contracts/auth/role.js';

interface PageEntry {
  path: string;
  name: string;
  /** A manager sees every page but the chief's own. */
  roles: readonly ViewerRole[];
}

const pages: readonly PageEntry[] = [
  { path: '/my-crew', name: 'My crew', roles: ['crewChief'] },
  { path: '/', name: 'Board', roles: ['dispatcher', 'technician', 'crewChief'] },
  { path: '/lost-fixes', name: 'Lost fixes', roles: ['dispatcher', 'technician'] },
  { path: '/weekly', name: 'Weekly', roles: ['dispatcher', 'technician'] },
  { path: '/crews', name: 'Crews', roles: ['dispatcher', 'technician'] },
  { path: '/rovers', name: 'Rovers', roles: ['dispatcher', 'technician'] },
  { path: '/corrections', name: 'Corrections', roles: ['dispatcher', 'technician'] },
  { path: '/sites', name: 'Sites', roles: ['dispatcher', 'technician'] },
  { path: '/logs', name: 'Logs', roles: ['dispatcher', 'technician'] },
  { path: '/users', name: 'Users', roles: [] },
  { path: '/settings', name: 'Settings', roles: [] },
];

export const pagesFor = (role: ViewerRole): readonly PageEntry[] =>
  pages.filter(({ path, roles }) => roles.includes(role) || (role === 'manager' && path !== '/my-crew'));
