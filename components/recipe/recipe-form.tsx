'use client';
import { useRouter } from 'next/navigation';
import { useMemo, useState } from 'react';
import { z } from 'zod';
import { changesFrom } from '@/components/recipe/changes-from';
import type { Proposal } from '@/components/recipe/propose-form';
import { recipeChecks, type RecipeCheck } from '@/components/recipe/recipe-checks';
import type { RecipeFacts } from '@/components/recipe/recipe-facts';
import type { RecipeFormState, RecipeRowKey } from '@/components/recipe/recipe-form-state';
import { recipeFromForm } from '@/components/recipe/recipe-from-form';
import { recipeWords } from '@/components/recipe/recipe-words';
import { rowOfProblem } from '@/components/recipe/row-of-problem';
import { ControlsRow } from '@/components/recipe/rows/controls-row';
import { EstimatorRow } from '@/components/recipe/rows/estimator-row';
import { FoldsRow } from '@/components/recipe/rows/folds-row';
import { LabelRow } from '@/components/recipe/rows/label-row';
import { NullRow } from '@/components/recipe/rows/null-row';
import { NuisanceRow } from '@/components/recipe/rows/nuisance-row';
import { SeedRow } from '@/components/recipe/rows/seed-row';
import { TrialsRow } from '@/components/recipe/rows/trials-row';
import { UnitsRow } from '@/components/recipe/rows/units-row';
import { ViewsRow } from '@/components/recipe/rows/views-row';
import { WindowRow } from '@/components/recipe/rows/window-row';
import { RunBar } from '@/components/recipe/run-bar';
import { useRecipeEstimate } from '@/components/recipe/use-recipe-estimate';
import { workWords } from '@/components/recipe/work-words';
import { numbers } from '@/components/ui/numbers';
import { Section } from '@/components/ui/section';
import { ApiError } from '@/lib/client/api-error';
import { requestJson } from '@/lib/client/request-json';

const createdSchema = z.object({ id: z.uuid() });

/** A new readout: its recipe row by row, checked while it is written, run from the bar at the foot. */
export function RecipeForm({
  facts,
  proposal,
  initial,
  fromNumber,
  nextNumber,
}: {
  facts: RecipeFacts;
  proposal: Proposal;
  initial: RecipeFormState;
  /** Number of the readout that is repeated. */
  fromNumber: number | null;
  nextNumber: number;
}) {
  const router = useRouter();
  const [form, setForm] = useState(initial);
  const [running, setRunning] = useState(false);
  const [error, setError] = useState<string | null>(null);
  const [refused, setRefused] = useState<RecipeCheck[]>([]);
  const set = (change: Partial<RecipeFormState>): void => {
    setForm((now) => ({ ...now, ...change }));
    setError(null);
    setRefused([]);
  };

  const { recipe, faults } = useMemo(() => recipeFromForm(form, facts), [form, facts]);
  const state = useRecipeEstimate(facts.sessionId, recipe);
  const local = useMemo(() => (recipe ? recipeChecks(recipe, facts) : []), [recipe, facts]);
  const fresh = state.estimate && !state.isOld ? state.estimate : null;
  const remote: RecipeCheck[] = (fresh?.problems ?? []).map((problem) => ({
    row: rowOfProblem(problem),
    severity: problem.severity,
    message: problem.remedy ? `${problem.message} ${problem.remedy}` : problem.message,
  }));
  const unread: RecipeCheck[] = faults.map(({ row, message }) => ({ row, severity: 'stops', message }));
  // The server's word replaces the page's own guess of the same weight at the same row.
  const checks = [
    ...unread,
    ...refused,
    ...remote,
    ...local.filter(
      (check) =>
        !remote.some(
          (other) =>
            other.row === check.row && (other.severity === check.severity || other.severity === 'stops'),
        ),
    ),
  ];
  const order = { stops: 0, warns: 1, notes: 2, fine: 3 } as const;
  const rowProps = (row: RecipeRowKey) => ({
    form,
    set,
    facts,
    checks: checks.filter((check) => check.row === row).sort((a, b) => order[a.severity] - order[b.severity]),
    faultOf: (field: keyof RecipeFormState) => faults.find((fault) => fault.field === field)?.message,
  });
  const stops = checks.filter((check) => check.severity === 'stops').length;
  const why = running
    ? 'The readout is being made.'
    : stops > 0
      ? `${stops === 1 ? 'One check stops' : `${stops} checks stop`} it.`
      : null;

  const run = async (): Promise<void> => {
    if (!recipe) return;
    setRunning(true);
    setError(null);
    try {
      const created = await requestJson(`/sessions/${facts.sessionId}/readouts`, {
        method: 'POST',
        body: { recipe },
        schema: createdSchema,
      });
      router.push(`/readouts/${created.id}`);
    } catch (cause) {
      setRunning(false);
      if (cause instanceof ApiError) {
        setError(cause.message);
        setRefused(
          cause.faults.map((fault) => ({
            row: rowOfProblem({ code: fault.code, place: { path: fault.pointer } }),
            severity: 'stops' as const,
            message: fault.detail,
          })),
        );
      } else setError('The readout could not be made. Try again.');
    }
  };

  const words = fresh
    ? recipeWords(
        fresh.recipe,
        { trialsUsed: fresh.trials, unitsUsed: fresh.units },
        facts.labels.find((label) => label.column === form.label)?.kind,
      )
    : null;
  const changes = fresh && form.from ? changesFrom(form.from, fresh.recipe) : null;
  return (
    <>
      {form.from && fromNumber !== null && (
        <Section tight title="Changed">
          <p className="say">
            {numbers(
              changes === null
                ? `As readout ${fromNumber}.`
                : changes.length === 0
                  ? `As readout ${fromNumber}, nothing changed so far: it would give the same numbers.`
                  : `As readout ${fromNumber}, but for ${changes.join(', ')}.`,
            )}
          </p>
        </Section>
      )}
      <LabelRow {...rowProps('label')} />
      <TrialsRow {...rowProps('trials')} />
      <UnitsRow {...rowProps('units')} />
      <WindowRow {...rowProps('window')} />
      <EstimatorRow {...rowProps('estimator')} />
      <FoldsRow {...rowProps('folds')} why={proposal.why.folds} />
      <NuisanceRow {...rowProps('nuisance')} />
      <NullRow {...rowProps('null')} why={proposal.why.null} />
      <ControlsRow {...rowProps('controls')} />
      <ViewsRow {...rowProps('views')} />
      <SeedRow {...rowProps('seed')} />
      <Section tight title="In words" id="words">
        <p className="lead" style={{ maxWidth: '54em' }}>
          {words ? (
            numbers(words)
          ) : (
            <span className="quiet">The recipe is written out here as soon as it can be read.</span>
          )}
        </p>
        <p className="cap">
          {numbers(`It will be exploratory, number ${nextNumber} on this session, and stays in its ledger.`)}
        </p>
      </Section>
      <RunBar
        checks={checks}
        estimate={state}
        work={recipe ? workWords(recipe) : 'not readable yet'}
        why={why}
        error={error}
        onRun={() => void run()}
      />
    </>
  );
}
