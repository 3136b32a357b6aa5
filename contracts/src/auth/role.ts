import { z } from 'zod';

export const roles = ['manager', 'dispatcher', 'technician', 'crewChief'] as const;
/** What a person may do. A manager may do everything; a crew chief reaches the own crew only. */
export const role = z.enum(roles);
export type Role = z.infer<typeof role>;

/** Who may read the board: people, and a wall display opened by link, which may do nothing else. */
export const viewerRole = z.enum([...roles, 'display']);
export type ViewerRole = z.infer<typeof viewerRole>;

export const roleNames: Record<Role, string> = {
  manager: 'Manager',
  dispatcher: 'Dispatcher',
  technician: 'Technician',
  crewChief: 'Crew chief',
};
