/** One GGA instant of one rover. Time is ms UTC; what the receiver left out is null, never 0. */
export interface Epoch {
  time: number;
  /** GGA quality indicator, 0 to 9. */
  quality: number;
  satellites: number | null;
  hdop: number | null;
  ageMs: number | null;
  stationId: number | null;
  latitude: number | null;
  longitude: number | null;
  altitudeM: number | null;
  geoidSeparationM: number | null;
  sigmaLatitudeM: number | null;
  sigmaLongitudeM: number | null;
  sigmaAltitudeM: number | null;
}

/** Standard deviations (GST) that came after their epoch had been handed on. */
export interface LateSigmas {
  time: number;
  sigmaLatitudeM: number | null;
  sigmaLongitudeM: number | null;
  sigmaAltitudeM: number | null;
}
