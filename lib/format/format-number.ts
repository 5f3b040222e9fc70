const noBreakSpace = '\u00a0';
const minus = '\u2212';

/**
 * Writes a number for people: fixed decimals, a real minus sign, thousands parted by a no-break space.
 * Minus zero after rounding loses its sign. null, NaN and infinities become an en dash ("cannot be worked out").
 */
export function formatNumber(value: number | null | undefined, decimals = 2): string {
  if (value === null || value === undefined || !Number.isFinite(value)) return '–';
  const digits = Math.abs(value).toFixed(decimals);
  const [whole, fraction] = digits.split('.');
  const grouped = whole.replace(/\B(?=(\d{3})+$)/g, noBreakSpace);
  const isNegative = value < 0 && Number(digits) !== 0;
  return `${isNegative ? minus : ''}${grouped}${fraction === undefined ? '' : `.${fraction}`}`;
}
