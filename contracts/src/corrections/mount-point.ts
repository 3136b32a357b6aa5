import { z } from 'zod';
import { instantText, latitude, longitude } from '../common.js';

/** One stream of a source table (STR record), read; what a caster left out or wrote wrongly is null. */
export const mountPoint = z.object({
  mountPoint: z.string(),
  identifier: z.string().nullable().describe('Usually the nearest town'),
  format: z.string().nullable(),
  formatDetails: z.string().nullable(),
  constellations: z.string().nullable(),
  network: z.string().nullable(),
  country: z.string().nullable(),
  latitude: latitude.nullable().describe('Rounded to about a kilometre; 0;0 is read as not known'),
  longitude: longitude.nullable(),
  distanceM: z.number().int().nullable(),
  wantsPosition: z.boolean().nullable(),
  isNetwork: z.boolean().nullable().describe('Computed from several stations'),
  authentication: z.enum(['none', 'basic', 'digest']).nullable(),
  fee: z.boolean().nullable(),
  bitrate: z.number().int().nullable(),
});
export type MountPoint = z.infer<typeof mountPoint>;

export const mountPointList = z.object({
  readAt: instantText,
  mountPoints: z.array(mountPoint),
  oddities: z.array(z.string()).describe('What is odd about the table, in words'),
});
export type MountPointList = z.infer<typeof mountPointList>;

export const mountPointQuery = z.object({
  siteId: z.coerce.number().int().positive().optional(),
  roverId: z.coerce.number().int().positive().optional(),
});
export type MountPointQuery = z.infer<typeof mountPointQuery>;
