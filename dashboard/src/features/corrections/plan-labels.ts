export interface Label {
  x: number;
  y: number;
  text: string;
}

const CHARACTER = 8.2;
const LINE = 16;

/** Which labels can be written without lying on one that came before, by index; the first always can. */
export function labelsThatFit(labels: readonly Label[]): Set<number> {
  const fit = new Set<number>();
  const boxes: { left: number; right: number; top: number }[] = [];
  labels.forEach(({ x, y, text }, index) => {
    const box = { left: x, right: x + text.length * CHARACTER, top: y };
    const isFree = boxes.every(
      ({ left, right, top }) => box.right < left || box.left > right || Math.abs(box.top - top) >= LINE,
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
