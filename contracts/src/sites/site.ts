import { z } from 'zod';
import { id, latitude, longitude, optionalText, shortText } from '../common.js';

export const siteBody = z.object({
  name: shortText('the name of the site'),
  latitude: latitude.nullable(),
  longitude: longitude.nullable(),
  note: optionalText(),
});
export type SiteBody = z.infer<typeof siteBody>;
export const changeSiteBody = siteBody.extend({ active: z.boolean() });
export type ChangeSiteBody = z.infer<typeof changeSiteBody>;
export const site = siteBody.extend({ id, active: z.boolean(), crewNames: z.array(z.string()) });
export type Site = z.infer<typeof site>;
export const siteList = z.array(site);
