const hues = [5, 1, 3, 7, 2];

/** Hue of a fold. It only repeats what the height says, so five hues may come round again. */
export function foldColour(fold: number): string {
  return `var(--c${hues[fold % hues.length]})`;
}
