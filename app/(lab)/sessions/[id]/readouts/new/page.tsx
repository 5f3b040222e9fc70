import { randomInt } from 'node:crypto';
import type { Metadata } from 'next';
import { readReadout } from '@/app/(lab)/readouts/[id]/read-readout';
import { readSession, readSurroundings, readTables } from '@/app/(lab)/sessions/[id]/read-session';
import { formFromRecipe } from '@/components/recipe/form-from-recipe';
import { proposeForm } from '@/components/recipe/propose-form';
import type { RecipeFacts } from '@/components/recipe/recipe-facts';
import { RecipeForm } from '@/components/recipe/recipe-form';
import { Sheet } from '@/components/shell/sheet';
import { ButtonLink } from '@/components/ui/button-link';
import { EmptyState } from '@/components/ui/empty-state';
import { numbers } from '@/components/ui/numbers';
import { Section } from '@/components/ui/section';
import { requirePageContext } from '@/lib/auth/page-context';
import { can } from '@/lib/policy/can';

export const metadata: Metadata = { title: 'New readout' };

interface PageProps {
  params: Promise<{ id: string }>;
  searchParams: Promise<{ from?: string | string[] }>;
}

export default async function NewReadoutPage({ params, searchParams }: PageProps) {
  const [{ id }, { from }] = await Promise.all([params, searchParams]);
  const ctx = await requirePageContext();
  const session = await readSession(id);
  const { study, exclusions, readouts } = await readSurroundings(session);
  const trail = [
    { label: study.name, href: `/studies/${study.id}` },
    { label: session.name, href: `/sessions/${session.id}` },
    { label: 'New readout' },
  ];
  const nextNumber = (readouts.items[0]?.number ?? 0) + 1;
  const mayRun = can(ctx.actor, 'readout.create');
  if (session.state !== 'ready' || session.dataVersion === null || !mayRun) {
    return (
      <Sheet trail={trail}>
        <Section>
          <h1 className="name">{numbers(`A new readout of ${session.name}`)}</h1>
          <div style={{ marginTop: 16 }}>
            <EmptyState
              title={
                mayRun ? 'There are no data to read out yet' : 'Your role may look at readouts, not make them'
              }
              action={<ButtonLink href={`/sessions/${session.id}`}>To the session</ButtonLink>}
            >
              {mayRun
                ? 'Bring the session’s files in and confirm them first.'
                : 'An analyst or a lead of the lab makes readouts.'}
            </EmptyState>
          </div>
        </Section>
      </Sheet>
    );
  }
  const tables = await readTables(session, exclusions);
  const areaPlace = tables.unitColumns.findIndex(
    (column) => column.type === 'category' && /^(area|region)$/i.test(column.name),
  );
  const facts: RecipeFacts = {
    sessionId: session.id,
    nTrials: session.trials ?? 0,
    nBins: session.bins ?? 0,
    binWidthMs: session.binWidthMs ?? 1,
    windowStartMs: session.windowStartMs ?? 0,
    labels: session.labels,
    trialColumns: tables.trialColumns,
    units: tables.units.map(({ rateHz, presence, values }) => {
      const area = areaPlace < 0 ? null : values[areaPlace];
      return { rateHz, presence, area: typeof area === 'string' ? area : null };
    }),
    areaColumn: areaPlace < 0 ? null : tables.unitColumns[areaPlace].name,
    excludedTrials: exclusions.excludedTrials,
    excludedUnits: exclusions.excludedUnits,
    exclusionsVersion: exclusions.version,
    blockColumn: tables.block?.name ?? null,
    rateHz: tables.rateHz,
    populationRateHz: (session.bins ?? 0) > 1 ? tables.populationRateHz : null,
  };
  const proposal = proposeForm(facts, randomInt(1, 2 ** 31));
  const repeated = typeof from === 'string' ? await readReadout(from) : null;
  const initial =
    repeated && repeated.sessionId === session.id
      ? formFromRecipe(repeated.recipe, facts, proposal.form)
      : proposal.form;
  return (
    <Sheet trail={trail}>
      <Section
        side={
          <p>
            {numbers(`It will be number ${nextNumber} on this session, and `)}
            <b style={{ color: 'var(--ink)' }}>exploratory</b>.
          </p>
        }
      >
        <h1 className="name">{numbers(`A new readout of ${session.name}`)}</h1>
        <p className="lead" style={{ marginTop: 4 }}>
          Checks stand in the margin beside the line that they are about. Everything fitted sees training
          trials only; no setting can change that.
        </p>
      </Section>
      <RecipeForm
        facts={facts}
        proposal={proposal}
        initial={initial}
        fromNumber={initial.from ? (repeated?.number ?? null) : null}
        nextNumber={nextNumber}
      />
    </Sheet>
  );
}
