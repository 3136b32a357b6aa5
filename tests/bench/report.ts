/** One measured row: ours, the floor of the same run, and their ratio. */
export interface Row {
  name: string;
  value: number;
  unit: string;
  floor: number | null;
  ratio: number | null;
  /** Rounds, or samples. */
  n: number;
}

const short = (value: number): string =>
  Math.abs(value) >= 100 ? value.toFixed(0) : Math.abs(value) >= 1 ? value.toFixed(2) : value.toPrecision(3);

export function printRow(row: Row, asJson: boolean): void {
  const round = (value: number | null) => (value === null ? null : Number(value.toPrecision(4)));
  if (asJson) {
    console.log(
      JSON.stringify({ ...row, value: round(row.value), floor: round(row.floor), ratio: round(row.ratio) }),
    );
    return;
  }
  const floor = row.floor === null ? '' : `  floor ${short(row.floor)}`;
  const ratio = row.ratio === null ? '' : `  ratio ${row.ratio.toFixed(2)}`;
  console.log(`${row.name.padEnd(34)} ${short(row.value)} ${row.unit}${floor}${ratio}  n=${row.n}`);
}
