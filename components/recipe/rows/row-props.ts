import type { RecipeCheck } from '@/components/recipe/recipe-checks';
import type { RecipeFacts } from '@/components/recipe/recipe-facts';
import type { RecipeFormState } from '@/components/recipe/recipe-form-state';

/** What each row of the form is given: the form, how to change it, the session's facts, and what is wrong. */
export interface RowProps {
  form: RecipeFormState;
  set: (change: Partial<RecipeFormState>) => void;
  facts: RecipeFacts;
  checks: readonly RecipeCheck[];
  faultOf: (field: keyof RecipeFormState) => string | undefined;
}
