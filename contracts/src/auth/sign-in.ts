import { z } from 'zod';
import { viewerRole } from './role.js';

export const email = z.email('Write an e-mail address such as name@firm.example').max(254).toLowerCase();
/** OWASP ASVS 5.0, 6.2: at least 8 (15 advised), long ones allowed, no composition rules. */
export const newPassword = z
  .string()
  .min(12, 'Use at least 12 characters; a few words are fine')
  .max(256, 'Use at most 256 characters');

export const signInBody = z.object({
  email,
  password: z.string().min(1, 'Write your password').max(256),
});
export type SignInBody = z.infer<typeof signInBody>;

/** Who is signed in, as the dashboard needs it. */
export const me = z.object({
  userId: z.number().int().nullable(),
  name: z.string(),
  email: z.string().nullable(),
  role: viewerRole,
  crewId: z.number().int().nullable(),
  firmName: z.string(),
  timeZone: z.string(),
  units: z.enum(['metric', 'feet']),
});
export type Me = z.infer<typeof me>;

/** Demo installations show their sign-ins; any other answers an empty list. */
export const signInHints = z.object({
  accounts: z.array(z.object({ email: z.string(), role: z.string() })),
  password: z.string().nullable(),
});
export type SignInHints = z.infer<typeof signInHints>;

export const forgotBody = z.object({ email });
export type ForgotBody = z.infer<typeof forgotBody>;

/** Sets a password through a link from an invitation, a reset mail, or the first start (then with name and e-mail). */
export const passwordBody = z.object({ token: z.string().min(20).max(200), password: newPassword });
export type PasswordBody = z.infer<typeof passwordBody>;

export const linkInfo = z.object({
  purpose: z.enum(['invite', 'reset', 'firstManager']),
  email: z.string().nullable(),
});
export type LinkInfo = z.infer<typeof linkInfo>;

export const firstManagerBody = passwordBody.extend({ name: z.string().trim().min(1).max(80), email });
export type FirstManagerBody = z.infer<typeof firstManagerBody>;
