'use client';
import { saveBlob } from '@/components/charts/save-blob';
import { Button } from '@/components/ui/button';

/** A recipe as the JSON that the API takes: to read in place, to copy or to save. */
export function RecipeJson({ json, fileName }: { json: string; fileName: string }) {
  return (
    <details>
      <summary>Recipe as JSON</summary>
      <div
        className="scroll"
        tabIndex={0}
        role="region"
        aria-label="Recipe as JSON"
        style={{ maxHeight: 420, overflow: 'auto' }}
      >
        <pre style={{ margin: '8px 0', fontFamily: 'var(--mono)', fontSize: 12, lineHeight: 1.45 }}>
          {json}
        </pre>
      </div>
      <Button
        kind="link"
        onClick={() =>
          saveBlob(new Blob([`${json}\n`], { type: 'application/json' }), `${fileName}-recipe.json`)
        }
      >
        Save it
      </Button>
    </details>
  );
}
