/** What a source's row says of its base. */
export interface BaseColumns {
  baseLatitude: number | null;
  baseLongitude: number | null;
  decodedLatitude: number | null;
  decodedLongitude: number | null;
}

/** Where a base is: as its own message 1005 or 1006 says, else as somebody typed; degrees. Null when nobody knows, and for a virtual base. */
export function basePlaceOf(row: BaseColumns): { latitude: number; longitude: number } | null {
  const { decodedLatitude, decodedLongitude, baseLatitude, baseLongitude } = row;
  if (decodedLatitude !== null && decodedLongitude !== null)
    return { latitude: decodedLatitude, longitude: decodedLongitude };
  return baseLatitude === null || baseLongitude === null
    ? null
    : { latitude: baseLatitude, longitude: baseLongitude };
}
