/** Reads what was typed as a number; thin and no-break spaces part thousands, a comma is a decimal point. */
export function readTypedNumber(text: string): number | null {
  const plain = text
    .replace(/[\s\u00a0\u202f]/g, '')
    .replace(',', '.')
    .replace('\u2212', '-');
  if (plain === '' || !/^[+-]?(\d+\.?\d*|\.\d+)(e[+-]?\d+)?$/i.test(plain)) return null;
  const value = Number(plain);
  return Number.isFinite(value) ? value : null;
}
