import type { SheetColumn } from '@/components/session/sheet-column';

/**
 * The column whose changes are drawn as block borders: the one that the recipe's folds or shuffles name, else one called
 * block, run or epoch; never one that changes with almost every trial.
 */
export function findBlockColumn(columns: readonly SheetColumn[], preferred?: string): SheetColumn | null {
  const candidates = [
    columns.find((column) => column.name === preferred),
    columns.find((column) => /^(block|run|epoch)s?(_?(id|no|number|index))?$/i.test(column.name)),
  ];
  for (const column of candidates) {
    if (!column) continue;
    let changes = 0;
    column.values.forEach((value, trial) => {
      if (trial > 0 && value !== column.values[trial - 1]) changes += 1;
    });
    if (changes > 0 && changes < column.values.length / 4) return column;
  }
  return null;
}
