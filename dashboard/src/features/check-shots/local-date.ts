/** The local day of an instant, YYYY-MM-DD. */
export const localDate = (at: number, zone: string): string =>
  // sv-SE writes dates as ISO 8601 does.
  new Intl.DateTimeFormat('sv-SE', { timeZone: zone }).format(at);
