import { z } from 'zod';
import { email } from '../auth/sign-in.js';
import { role } from '../auth/role.js';
import { id, instantText, shortText } from '../common.js';

export const user = z.object({
  id,
  name: z.string(),
  email: z.string(),
  role,
  crewId: id.nullable(),
  status: z.enum(['invited', 'active', 'off']),
  lastSignInAt: instantText.nullable(),
});
export type User = z.infer<typeof user>;

const needsCrew = (body: { role?: string | undefined; crewId?: number | null | undefined }) =>
  body.role !== 'crewChief' || (body.crewId !== null && body.crewId !== undefined);
const crewNeeded = { message: 'A crew chief needs a crew', path: ['crewId'] };

export const inviteUserBody = z
  .object({ name: shortText('a name'), email, role, crewId: id.nullable() })
  .refine(needsCrew, crewNeeded);
export type InviteUserBody = z.infer<typeof inviteUserBody>;

export const changeUserBody = z
  .object({ name: shortText('a name'), role, crewId: id.nullable(), active: z.boolean() })
  .refine(needsCrew, crewNeeded);
export type ChangeUserBody = z.infer<typeof changeUserBody>;

export const userList = z.array(user);

/** When no mail could be sent, the manager gets the link to hand over; else it is null. */
export const invitedUser = z.object({ user, link: z.string().nullable() });
export type InvitedUser = z.infer<typeof invitedUser>;
