import type { Role } from '@/lib/contracts/lab';
import type { NuisanceColumn, RecipeInput } from '@/lib/contracts/recipe';
import type { RecordingPlan } from './recording-plan';

export interface DemoReadout {
  by: Role;
  recipe: Omit<RecipeInput, 'label'> & { label?: string };
  /** Stop it right after it was asked for: the ledger keeps cancelled readouts too. */
  cancel?: true;
}

export interface DemoSession {
  animal: string;
  name: string;
  startedAt: string;
  plan: RecordingPlan;
  exclusions: { by: Role; kind: 'trials' | 'units'; from: number; to: number; reason: string }[];
  readouts: DemoReadout[];
}

/** Everything here is invented: the lab, its people, its animals and its recordings. */
export const demoLab = {
  name: 'Withy Lane Lab',
  members: [
    { role: 'lead', email: 'lead@demo.outfold.test', name: 'Isolde' },
    { role: 'analyst', email: 'analyst@demo.outfold.test', name: 'Teun' },
    { role: 'experimenter', email: 'experimenter@demo.outfold.test', name: 'Maud' },
    { role: 'observer', email: 'observer@demo.outfold.test', name: 'Wren' },
  ] satisfies { role: Role; email: string; name: string }[],
  study: {
    name: 'Shared motion in MT and MST',
    question:
      'Does the population in MT and MST carry the shared-motion fraction of a moving scene, beyond what speed, contrast and firing rate explain?',
  },
  animals: [
    { code: 'Sorrel', species: 'Callithrix jacchus', sex: 'male', bornOn: '2023-10-02' },
    { code: 'Teasel', species: 'Callithrix jacchus', sex: 'female', bornOn: '2024-03-11' },
    { code: 'Yarrow', species: 'Callithrix jacchus', sex: 'male', bornOn: '2023-07-20' },
  ],
} as const;

export const otherLab = {
  name: 'Saltmarsh Lab',
  members: [{ role: 'lead', email: 'lead@other.outfold.test', name: 'Ansel' }] satisfies {
    role: Role;
    email: string;
    name: string;
  }[],
};

const scene = { startMs: 80, endMs: 480 };
const blocks = { kind: 'contiguous', k: 5, purgeTrials: 6 } as const;
const before = { startMs: -200, endMs: 0 };
const nuisances = [
  { column: 'speed', term: 'spline' },
  { column: 'contrast', term: 'category' },
  { column: 'pupil', term: 'linear' },
] as const satisfies NuisanceColumn[];
const withinBlock = { kind: 'within', column: 'block', draws: 1000 } as const;

/** The lab's usual recipe with the controls that a reviewer asks for first. */
const usual = (seed: number, views: RecipeInput['views'] = []): Omit<RecipeInput, 'label'> => ({
  window: scene,
  transform: 'sqrt',
  folds: blocks,
  null: withinBlock,
  controls: [
    { kind: 'window', ...before },
    { kind: 'nuisanceOnly', columns: [...nuisances] },
    { kind: 'incremental', columns: [...nuisances] },
    { kind: 'totalRate' },
    { kind: 'trialOrder' },
  ],
  views,
  seed,
});
export const demoSessions: DemoSession[] = [
  {
    animal: 'Sorrel',
    name: 'Sorrel, 14 May 2026',
    startedAt: '2026-05-14T08:42:00Z',
    plan: {
      seed: 20260514,
      nTrials: 640,
      nBlocks: 8,
      areas: [
        { name: 'MT', nUnits: 96 },
        { name: 'MST', nUnits: 46 },
      ],
      carriers: 0.32,
      design: 'signal',
      driftSd: 0.35,
    },
    exclusions: [
      {
        by: 'experimenter',
        kind: 'trials',
        from: 310,
        to: 318,
        reason: 'Room light off: the screen was the only light, and the eye tracker lost the pupil.',
      },
    ],
    readouts: [
      {
        by: 'analyst',
        recipe: {
          window: scene,
          features: 'bins',
          estimator: { kind: 'leastSquares' },
          null: { kind: 'free', draws: 200 },
          seed: 1,
        },
      },
      { by: 'analyst', recipe: { window: scene, seed: 2 } },
      {
        by: 'analyst',
        recipe: {
          window: scene,
          folds: blocks,
          null: { kind: 'within', column: 'block', draws: 20_000 },
          seed: 3,
        },
        cancel: true,
      },
      {
        by: 'analyst',
        recipe: { window: before, folds: blocks, null: withinBlock, seed: 4 },
      },
      {
        by: 'analyst',
        recipe: usual(20260514, [
          { kind: 'timeCourse', widthMs: 100, stepMs: 40 },
          { kind: 'populationSize', sizes: [1, 2, 4, 8, 16, 32, 64, 128], draws: 20 },
          { kind: 'weights' },
        ]),
      },
    ],
  },
  {
    animal: 'Sorrel',
    name: 'Sorrel, 19 May 2026',
    startedAt: '2026-05-19T09:05:00Z',
    plan: {
      seed: 20260519,
      nTrials: 400,
      nBlocks: 5,
      areas: [
        { name: 'MT', nUnits: 40 },
        { name: 'MST', nUnits: 38 },
      ],
      carriers: 0.3,
      design: 'signal',
      driftSd: 0.35,
    },
    exclusions: [],
    readouts: [{ by: 'analyst', recipe: usual(20260519) }],
  },
  {
    animal: 'Teasel',
    name: 'Teasel, 21 May 2026',
    startedAt: '2026-05-21T08:30:00Z',
    plan: {
      seed: 20260521,
      nTrials: 480,
      nBlocks: 6,
      areas: [{ name: 'MT', nUnits: 84 }],
      carriers: 0,
      design: 'noise',
      driftSd: 0.35,
    },
    exclusions: [],
    readouts: [{ by: 'analyst', recipe: usual(20260521) }],
  },
  {
    animal: 'Yarrow',
    name: 'Yarrow, 3 June 2026',
    startedAt: '2026-06-03T10:12:00Z',
    plan: {
      seed: 20260603,
      nTrials: 480,
      nBlocks: 6,
      areas: [{ name: 'MST', nUnits: 90 }],
      carriers: 0,
      design: 'speedTied',
      driftSd: 0.35,
    },
    exclusions: [],
    readouts: [{ by: 'analyst', recipe: usual(20260603) }],
  },
];

export const demoLabel = 'shared_motion_fraction';
