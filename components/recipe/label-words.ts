/** A column's name as words for titles and sentences: shared_motion_fraction becomes "shared motion fraction". */
export function labelWords(column: string): string {
  return column.replaceAll('_', ' ').trim() || column;
}
