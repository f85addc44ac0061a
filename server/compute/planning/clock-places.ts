const wholeTurn = 360;
/** Clock angles closer than this, degrees, are one place; steps end this far before the end of their range. */
const samePlaceDeg = 1e-6;

/** An arc that can be reached, clockwise from one clock angle to another. */
export interface ClockRange {
  readonly fromDeg: number;
  readonly toDeg: number;
}

/**
 * Places `stepDeg` apart, from the first end of each range on, its last end among them; a range of a whole turn or more
 * is the whole turn. In order, places that an earlier range holds too are there twice. Stops at `placesMax` + 1.
 */
export function placesInRanges(ranges: readonly ClockRange[], stepDeg: number, placesMax: number): number[] {
  const places: number[] = [];
  for (const { fromDeg, toDeg } of ranges) {
    const beyond = toDeg - fromDeg;
    const spanDeg = Math.abs(beyond) >= wholeTurn ? wholeTurn : turned(beyond);
    const steps = Math.ceil((spanDeg - samePlaceDeg) / stepDeg);
    for (let step = 0; step < steps && places.length <= placesMax; step++)
      places.push(fromDeg + step * stepDeg);
    if (spanDeg < wholeTurn) places.push(fromDeg + spanDeg);
  }
  return places;
}

/** Each place once, [0, 360), where it stands first. */
export function distinctPlaces(clockDegs: readonly number[]): number[] {
  const known = new Set<number>();
  return clockDegs.map(turned).filter((clockDeg) => {
    const key = placeKey(clockDeg);
    const isNew = !known.has(key);
    known.add(key);
    return isNew;
  });
}

/** The same for the same place, whatever turns were added to it. */
export function placeKey(clockDeg: number): number {
  return Math.round(turned(clockDeg) / samePlaceDeg) % Math.round(wholeTurn / samePlaceDeg);
}

function turned(deg: number): number {
  const rest = deg % wholeTurn;
  const positive = rest < 0 ? rest + wholeTurn : rest;
  return positive >= wholeTurn ? 0 : positive;
}
