import type { LogWithDetail } from '@hubtack/contracts/logs/log.js';
import type { Client } from './client.js';
import { until } from './until.js';

export interface UploadAnswer {
  status: number;
  body: { id: number; code?: string; detail?: string; errors?: { pointer: string; detail: string }[] };
}

/** Uploads a log as a browser's form does. */
export async function uploadLog(
  client: Client,
  content: string | Uint8Array,
  fields: Record<string, string> = {},
  name = 'day.nmea',
): Promise<UploadAnswer> {
  const form = new FormData();
  for (const [field, value] of Object.entries(fields)) form.append(field, value);
  form.append('file', new Blob([typeof content === 'string' ? content : new Uint8Array(content)]), name);
  const response = await fetch(new URL('/api/logs', client.url), {
    method: 'POST',
    headers: { cookie: client.cookieHeader },
    body: form,
  });
  return { status: response.status, body: (await response.json()) as UploadAnswer['body'] };
}

/** The log once it has been read, or could not be. */
export const readLog = (client: Client, id: number): Promise<LogWithDetail> =>
  until(async () => {
    const log = await client.json<LogWithDetail>('GET', `/api/logs/${id}`);
    if (log.status === 'waiting' || log.status === 'reading') throw new Error(`log ${id} is ${log.status}`);
    return log;
  }, 60_000);

/** Uploads and waits until it has been read. */
export async function analysed(
  client: Client,
  content: string | Uint8Array,
  fields: Record<string, string> = {},
): Promise<LogWithDetail> {
  const { status, body } = await uploadLog(client, content, fields);
  if (status !== 202) throw new Error(`the upload answers ${status}: ${body.detail}`);
  return readLog(client, body.id);
}
