import type { TimelineAnswer } from '@hubtack/contracts/fixes/timeline.js';
import type { Client } from './client.js';

export const timelineOf = (
  client: Client,
  roverId: number,
  from: string,
  to: string,
): Promise<TimelineAnswer> =>
  client.json<TimelineAnswer>('GET', `/api/rovers/${roverId}/timeline?from=${from}&to=${to}`);
