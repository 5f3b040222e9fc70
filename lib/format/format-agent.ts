const browsers: readonly [RegExp, string][] = [
  [/\bEdg\//, 'Edge'],
  [/\bOPR\//, 'Opera'],
  [/\bFirefox\//, 'Firefox'],
  [/Chrom(e|ium)\//, 'Chrome'],
  [/\bSafari\//, 'Safari'],
];
const systems: readonly [RegExp, string][] = [
  [/Android/, 'Android'],
  [/iPhone|iPad/, 'iOS'],
  [/Windows/, 'Windows'],
  [/Mac OS X|Macintosh/, 'macOS'],
  [/Linux/, 'Linux'],
];

/** A browser's User-Agent header as people say it: “Firefox on Linux”; what is not recognised, shortened as it is. */
export function formatAgent(agent: string): string {
  const find = (names: readonly [RegExp, string][]) => names.find(([pattern]) => pattern.test(agent))?.[1];
  const [browser, system] = [find(browsers), find(systems)];
  if (browser && system) return `${browser} on ${system}`;
  const plain = (browser ?? agent.trim()) || 'not told';
  return plain.length > 60 ? `${plain.slice(0, 59)}…` : plain;
}
