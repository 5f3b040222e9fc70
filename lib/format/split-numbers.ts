const gap = '\u00a0';
const number = `[−+]?\\d[\\d${gap}]*(?:[.:]\\d+)*`;
const notInsideWord = '(?<![\\w#;&/.])';
const pattern = new RegExp(
  [
    // p = 0.001, ρ = −0.20: a symbol and its number stay together
    `${notInsideWord}(?:p|r²?|ρ|τ²?|λ)${gap}?[=<]${gap}?${number}`,
    // 0.45 [0.40, 0.50] and an interval alone
    `(?:${notInsideWord}${number}${gap})?\\[${number},${gap}${number}\\]`,
    // plain numbers; R² and P1 stay words, and so does the per cent sign, whose space would be a whole figure wide in mono
    `${notInsideWord}${number}(?![\\w²])`,
    // Greek letters exist in the mono face only
    '[\\u0370-\\u03ff]²?',
  ].join('|'),
  'g',
);

/** Gives negative numbers a real minus sign, and ties what must never part at a line end: "R² 0.45", "trial 7", "1 000", "[0.40, 0.50]", "p = 0.001". */
function tie(text: string): string {
  return text
    .replace(/(^|[\s(\[=,])-(?=\d)/g, '$1−')
    .replace(
      /(^|[\s(,])(r|p|Q|n|R²|I²|trials?|readout|units?|block|fold|bin|line|column|plan) (?=[−+]?\d)/g,
      `$1$2${gap}`,
    )
    .replace(/(\d) (?=\d{3}\b)/g, `$1${gap}`)
    .replace(/(\[[−+]?[\d.]+,) (?=[−+]?[\d.]+\])/g, `$1${gap}`)
    .replace(/(\d) (?=\[[−+]?\d)/g, `$1${gap}`)
    .replace(/(?<!\w)([pr]²?|R²|ρ|λ) (=|<) (?=[−+]?\d)/g, `$1${gap}$2${gap}`)
    .replace(/(\d) (?=(?:%|ms|s|min|h|kB|MB|GB|spikes\/s)(?![\w/]))/g, `$1${gap}`);
}

/** Parts a sentence into words and numbers, so that the numbers can be set in the mono face. */
export function splitNumbers(text: string): { text: string; isNumber: boolean }[] {
  const tied = tie(text);
  const pieces: { text: string; isNumber: boolean }[] = [];
  let from = 0;
  for (const match of tied.matchAll(pattern)) {
    if (match.index > from) pieces.push({ text: tied.slice(from, match.index), isNumber: false });
    // a trailing no-break space belongs to the words that follow
    const value = match[0].replace(/\u00a0+$/, '');
    pieces.push({ text: value, isNumber: true });
    from = match.index + value.length;
  }
  if (from < tied.length) pieces.push({ text: tied.slice(from), isNumber: false });
  return pieces;
}
