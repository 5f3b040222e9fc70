import type { Place } from '@/lib/contracts/problem';

/** Writes where a problem lies, for people: trials, units, bins and folds count from 1. Empty where no place is known. */
export function formatPlace(place: Place): string {
  const parts: string[] = [];
  if (place.file !== undefined) parts.push(place.file);
  if (place.path !== undefined && place.path !== '') parts.push(place.path);
  const counted: [string, number | undefined][] = [
    ['trial', place.trial],
    ['unit', place.unit],
    ['bin', place.bin],
    ['fold', place.fold],
  ];
  const numbered = counted.flatMap(([word, index]) => (index === undefined ? [] : [`${word} ${index + 1}`]));
  if (place.line !== undefined) numbered.push(`line ${place.line}`);
  if (place.column !== undefined) numbered.push(`column ${place.column}`);
  if (numbered.length > 0) parts.push(numbered.join(', '));
  return parts.join(' · ');
}
