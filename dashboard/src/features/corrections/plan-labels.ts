export interface Label {
  x: number;
  y: number;
  text: string;
}

const BESIDE = 10;
const CHARACTER = 9;
const LINE = 16;
const POINT = 6;

/** Which labels, by index, can be written without lying on another point or on a label that came before. */
export function labelsThatFit(labels: readonly Label[]): Set<number> {
  const fit = new Set<number>();
  // A label may not hide a point either, but begins at its own.
  const boxes = labels.map(({ x, y }) => ({ left: x - POINT, right: x + POINT, top: y }));
  labels.forEach(({ x, y, text }, index) => {
    const box = { left: x, right: x + BESIDE + text.length * CHARACTER, top: y };
    const isFree = boxes.every(
      ({ left, right, top }, other) =>
        other === index || box.right < left || box.left > right || Math.abs(box.top - top) >= LINE,
    );
    if (!isFree) return;
    fit.add(index);
    boxes.push(box);
  });
  return fit;
}

/** Longitudes near this one, so that a plan across the date line does not go round the world. */
export const longitudeNear = (longitude: number, near: number): number =>
  near + ((((longitude - near + 180) % 360) + 360) % 360) - 180;
