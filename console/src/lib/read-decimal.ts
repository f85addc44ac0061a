/**
 * A number as people type it: with a decimal point or a decimal comma, and with either minus sign. Empty is null; what
 * is no number, or could be read two ways, is NaN, which every schema refuses.
 */
export function readDecimal(text: string): number | null {
  const plain = text.trim().replace("\u2212", "-");
  if (plain === "") return null;
  const isNumber = /^[+-]?(?:\d+(?:[.,]\d*)?|[.,]\d+)(?:[eE][+-]?\d+)?$/.test(plain);
  return isNumber ? Number(plain.replace(",", ".")) : NaN;
}
