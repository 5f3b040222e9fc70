'use client';
import { RecipeRow } from '@/components/recipe/recipe-row';
import type { RowProps } from '@/components/recipe/rows/row-props';
import { TypedField } from '@/components/recipe/typed-field';
import { Button } from '@/components/ui/button';

/** Where the random choices of folds and shuffles start. */
export function SeedRow({ form, set, checks, faultOf }: RowProps) {
  return (
    <RecipeRow
      id="seed"
      term="Seed"
      because="Same data, recipe, seed and engine give the same numbers."
      checks={checks}
    >
      <div className="inline" style={{ margin: 0 }}>
        <TypedField
          label="Seed"
          width="9em"
          value={form.seed}
          error={faultOf('seed')}
          onChange={(seed) => set({ seed })}
        />
        <Button
          kind="link"
          onClick={() => set({ seed: String(crypto.getRandomValues(new Uint32Array(1))[0]) })}
        >
          Another
        </Button>
      </div>
    </RecipeRow>
  );
}
