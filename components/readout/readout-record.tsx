import { recipeWords } from '@/components/recipe/recipe-words';
import { DownloadPredictions } from '@/components/readout/download-predictions';
import { RecipeJson } from '@/components/readout/recipe-json';
import { numbers } from '@/components/ui/numbers';
import type { Readout } from '@/lib/contracts/readout';
import type { LabelFact } from '@/lib/contracts/session';
import { formatDuration } from '@/lib/format/format-duration';
import { formatInstant } from '@/lib/format/format-instant';
import { formatPlural } from '@/lib/format/format-plural';

function shortHash(hash: string): string {
  return `sha256 ${hash.slice(0, 8)} ${hash.slice(8, 16)} … ${hash.slice(-4)}`;
}

/** Enough to get the same numbers again: ids, hashes, versions, machine, times, the recipe in words and as JSON. */
export function ReadoutRecord({
  readout,
  labelKind,
  fileName,
}: {
  readout: Readout;
  labelKind: LabelFact['kind'] | undefined;
  fileName: string;
}) {
  const { provenance, recipe, result } = readout;
  const libraries = Object.entries(provenance?.libraries ?? {}).map(
    ([name, version]) => `${name} ${version}`,
  );
  const rows: [string, string, string?][] = provenance
    ? [
        ['readout', readout.id],
        ['data', `version ${provenance.dataVersion}, ${shortHash(provenance.dataHash)}`, provenance.dataHash],
        ['recipe', shortHash(provenance.recipeHash), provenance.recipeHash],
        ['seed', String(provenance.seed)],
        ['engine', `${provenance.engineVersion}, ${provenance.backend}`],
        ['libraries', libraries.join(', ') || 'none beyond the engine'],
        ['core type', provenance.coreType],
        [
          'ran',
          `${formatInstant(provenance.startedAt)}, ${formatDuration(provenance.durationMs / 1000)}, of which computing ${formatDuration(provenance.computeMs / 1000)}`,
        ],
        ['tries', formatPlural(provenance.attempts, 'try', 'tries')],
        ['by', readout.authorName],
      ]
    : [
        ['readout', readout.id],
        ['by', readout.authorName],
        ['asked for', formatInstant(readout.createdAt)],
      ];
  const json = JSON.stringify(recipe, null, 2);
  const counts = {
    trialsUsed: result?.counts.trialsUsed ?? null,
    unitsUsed: result?.counts.unitsUsed ?? null,
  };
  return (
    <div className="figs" style={{ gridTemplateColumns: 'minmax(0, 1.15fr) minmax(0, 1fr)' }}>
      <dl className="kv" style={{ gap: '4px 16px' }}>
        {rows.map(([term, value, whole]) => (
          <RecordRow key={term} term={term} value={value} whole={whole} />
        ))}
      </dl>
      <div>
        <h3>Recipe</h3>
        <p className="lead" style={{ fontSize: 14 }}>
          {numbers(recipeWords(recipe, counts, labelKind))}
        </p>
        <div className="spaced" style={{ marginTop: 12, fontSize: 14 }}>
          <RecipeJson json={json} fileName={fileName} />
          {readout.state === 'done' && (
            <p>
              <DownloadPredictions readoutId={readout.id} fileName={fileName} />
            </p>
          )}
        </div>
      </div>
    </div>
  );
}

function RecordRow({ term, value, whole }: { term: string; value: string; whole?: string }) {
  return (
    <>
      <dt>{term}</dt>
      <dd style={{ overflowWrap: 'anywhere' }} title={whole}>
        {value}
        {whole && <span className="vh">, in full {whole}</span>}
      </dd>
    </>
  );
}
