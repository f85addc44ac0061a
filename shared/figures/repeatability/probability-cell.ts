import { numberCell, textCell, type Cell } from "../figure-table.ts";

const decimals = 4;
const leastShown = 10 ** -decimals;

/** A probability; what would be written as nothing is written as less than the last place. */
export function probabilityCell(probability: number | null): Cell {
  if (probability !== null && probability < leastShown) return textCell(`< ${leastShown.toFixed(decimals)}`);
  return numberCell(probability, decimals);
}

/** Whether an effect is more than chance; a dash where it cannot be told. */
export function significanceCell(significant: boolean | null): Cell {
  return textCell(significant === null ? "–" : significant ? "significant" : "chance");
}
