import { DateTime } from 'luxon';

const FORMAT = "yyyy-MM-dd'T'HH:mm";

/** An instant as a date and time field wants it, in the firm's zone. */
export const fieldText = (instant: number, zone: string): string =>
  DateTime.fromMillis(instant, { zone }).toFormat(FORMAT);

/**
 * What a date and time field says, in the firm's zone, as ISO 8601 UTC text; null when it says nothing that can be read. A field knows
 * minutes only: an instant that nobody touched (`was`) keeps its seconds.
 */
export function instantOf(text: string | null, zone: string, was: number | null = null): string | null {
  if (!text) return null;
  if (was !== null && text.slice(0, 16) === fieldText(was, zone)) return new Date(was).toISOString();
  const time = DateTime.fromFormat(text.slice(0, 16), FORMAT, { zone });
  return time.isValid ? time.toUTC().toISO() : null;
}
