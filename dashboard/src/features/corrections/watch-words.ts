const CHOICES = [15, 30, 60, 120, 240, 720, 1440];

/** Every 15 minutes, every hour, every 4 hours, once a day. */
export function watchWords(minutes: number | null): string {
  if (minutes === null) return 'off';
  if (minutes === 60) return 'every hour';
  if (minutes === 1440) return 'once a day';
  return minutes % 60 === 0 ? `every ${minutes / 60} hours` : `every ${minutes} minutes`;
}

/** What can be chosen; a source that was set otherwise keeps its own. */
export const watchChoices = (current: number | null) =>
  [...new Set([...CHOICES, ...(current === null ? [] : [current])])]
    .toSorted((a, b) => a - b)
    .map((value) => ({ value, label: watchWords(value).replace(/^./, (first) => first.toUpperCase()) }));
