import { z } from 'zod';
import { id, instantText, shortText } from '../common.js';

/** A read-only board for a screen on the wall: opened by link, taken back by a manager. */
export const displayLink = z.object({
  id,
  name: z.string(),
  createdAt: instantText,
  lastOpenedAt: instantText.nullable(),
});
export type DisplayLink = z.infer<typeof displayLink>;
export const displayLinkList = z.array(displayLink);
export const displayLinkBody = z.object({ name: shortText('where the screen hangs') });
export type DisplayLinkBody = z.infer<typeof displayLinkBody>;
/** The link's token, shown once. */
export const issuedDisplayLink = z.object({ id, token: z.string() });
export type IssuedDisplayLink = z.infer<typeof issuedDisplayLink>;
export const openDisplayBody = z.object({ token: z.string().min(20).max(200) });
export type OpenDisplayBody = z.infer<typeof openDisplayBody>;
