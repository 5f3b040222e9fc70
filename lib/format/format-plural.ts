import { formatCount } from '@/lib/format/format-count';

/** Writes a count with its noun: 1 trial, 2 trials, 1 000 trials. */
export function formatPlural(count: number, one: string, many = `${one}s`): string {
  return `${formatCount(count)}\u00a0${count === 1 ? one : many}`;
}
