import type { ViewNumbers } from '@/components/readout/view-numbers';
import { ViewFigure } from '@/components/readout/view-figure';
import { Section } from '@/components/ui/section';

const groups: { id: string; title: string; why: string; kinds: ViewNumbers['kind'][]; columns: string }[] = [
  {
    id: 'when',
    title: 'When',
    why: 'From which moment, and is it one code or a changing one?',
    kinds: ['timeCourse', 'temporalGeneralisation'],
    columns: 'minmax(0, 1fr) 440px',
  },
  {
    id: 'how-many',
    title: 'How many',
    why: 'Does it saturate with units and with trials?',
    kinds: ['populationSize', 'learning'],
    columns: 'minmax(0, 1fr) minmax(0, 1fr)',
  },
  {
    id: 'units',
    title: 'Weights and units',
    why: 'A weight says how the readout uses a unit; only the pattern says how the unit follows the label.',
    kinds: ['weights', 'singleUnits'],
    columns: 'minmax(0, 1.4fr) minmax(0, 1fr)',
  },
];

/** The views of a readout, grouped by the question that they answer. Groups without a view are not there. */
export function ViewSections({
  views,
  window,
  draws,
  isRoot,
  fileName,
}: {
  views: readonly ViewNumbers[];
  window: { startMs: number; endMs: number };
  draws: number;
  isRoot: boolean;
  fileName: string;
}) {
  return groups.map((group) => {
    const inside = views.filter((view) => group.kinds.includes(view.kind));
    if (inside.length === 0) return null;
    return (
      <Section key={group.id} id={group.id} title={group.title} why={group.why}>
        <div
          className="figs"
          style={{ gridTemplateColumns: inside.length > 1 ? group.columns : 'minmax(0, 760px)' }}
        >
          {inside.map((view, index) => (
            <ViewFigure
              key={index}
              view={view}
              window={window}
              draws={draws}
              isRoot={isRoot}
              fileName={fileName}
            />
          ))}
        </div>
      </Section>
    );
  });
}
