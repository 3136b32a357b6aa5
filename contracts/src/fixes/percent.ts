/**
 * A share as it may be shown: one decimal, never rounded up to 100.0 nor down to 0.0, and "no data" when there is nothing
 * to take a share of (design: "Figures"). 0.9996 reads 99.9 %, 0.0004 reads 0.1 %.
 */
export function percent(part: number, whole: number): string {
  if (whole <= 0) return 'no data';
  const tenths = Math.round((part / whole) * 1000);
  if (tenths === 1000 && part < whole) return '99.9 %';
  if (tenths === 0 && part > 0) return '0.1 %';
  return `${(tenths / 10).toFixed(1)} %`;
}
