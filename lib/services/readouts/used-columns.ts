import type { Recipe } from '@/lib/contracts/recipe';

/** Trial columns that a recipe needs a value of at every trial, with where the recipe names each. */
export function usedColumns(recipe: Recipe): { column: string; pointer: string }[] {
  const used = [{ column: recipe.label, pointer: '/recipe/label' }];
  const add = (column: string | undefined, pointer: string) => {
    if (column !== undefined) used.push({ column, pointer });
  };
  if (recipe.folds.kind === 'leaveOneGroupOut') add(recipe.folds.groupColumn, '/recipe/folds/groupColumn');
  if (recipe.null.kind === 'within' || recipe.null.kind === 'groups')
    add(recipe.null.column, '/recipe/null/column');
  recipe.nuisance.columns.forEach(({ column }, at) => add(column, `/recipe/nuisance/columns/${at}/column`));
  recipe.controls.forEach((control, at) => {
    if ('columns' in control)
      control.columns.forEach(({ column }, c) => add(column, `/recipe/controls/${at}/columns/${c}/column`));
    if ('column' in control) add(control.column, `/recipe/controls/${at}/column`);
  });
  return used;
}
