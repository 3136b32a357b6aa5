const METRES_A_DEGREE = 111_320;

export interface Place {
  latitude: number;
  longitude: number;
}

export interface PlanScale {
  x: (place: Place) => number;
  y: (place: Place) => number;
  /** Length of a metre on the plan. */
  perMetre: number;
}

/**
 * A plain plan: east to the right, north up, one scale for both, true in the middle of the places. Good for a day's
 * drive; it is a picture of who is where, not a map.
 */
export function planScale(
  places: readonly Place[],
  width: number,
  height: number,
  margin: number,
): PlanScale {
  const latitudes = places.map(({ latitude }) => latitude);
  const longitudes = places.map(({ longitude }) => longitude);
  const middle = (values: number[]) => (Math.min(...values) + Math.max(...values)) / 2;
  const [latitude, longitude] = [middle(latitudes), middle(longitudes)];
  const shrink = Math.cos((latitude * Math.PI) / 180);
  const east = (place: Place) => (place.longitude - longitude) * METRES_A_DEGREE * shrink;
  const north = (place: Place) => (place.latitude - latitude) * METRES_A_DEGREE;
  // Never closer than a kilometre across, so that one place alone does not fill the world.
  const reach = Math.max(
    500,
    ...places.map((place) => Math.max(Math.abs(east(place)) * (height / width), Math.abs(north(place)))),
  );
  const perMetre = (height / 2 - margin) / reach;
  return {
    x: (place) => width / 2 + east(place) * perMetre,
    y: (place) => height / 2 - north(place) * perMetre,
    perMetre,
  };
}

/** The longest round length (1, 2 or 5 times a power of ten) that a scale bar of at most `longest` can show, metres. */
export function scaleBarMetres(perMetre: number, longest: number): number {
  const most = longest / perMetre;
  const power = 10 ** Math.floor(Math.log10(most));
  return [5, 2, 1].map((factor) => factor * power).find((length) => length <= most)!;
}
