import type { ControlRecipe, NuisanceColumn, Recipe, ViewRecipe } from '@/lib/contracts/recipe';

export type PenaltyChoice = 'leaveOneOut' | 'gcv' | 'innerFolds' | 'value';

/** The fields of a new readout as they are typed; numbers stay text until they are read. */
export interface RecipeFormState {
  label: string;
  labelTransform: Recipe['labelTransform']['kind'];
  trials: 'all' | 'where' | 'kept';
  trialColumn: string;
  trialOp: '=' | '!=' | '<' | '<=' | '>' | '>=';
  trialValue: string;
  units: 'all' | 'rule' | 'area' | 'list' | 'kept';
  minRate: string;
  minPresence: string;
  area: string;
  unitList: string;
  startMs: string;
  endMs: string;
  features: Recipe['features'];
  transform: Recipe['transform'];
  estimator: Recipe['estimator']['kind'];
  choose: PenaltyChoice;
  value: string;
  innerFolds: string;
  grid: 'default' | 'own';
  gridFrom: string;
  gridTo: string;
  gridCount: string;
  maxComponents: string;
  folds: 'stratified' | 'contiguous' | 'leaveOneGroupOut' | 'kept';
  k: string;
  purge: string;
  repeats: string;
  groupColumn: string;
  nuisance: Readonly<Record<string, NuisanceColumn['term']>>;
  handling: Recipe['nuisance']['handling'];
  null: 'none' | 'free' | 'within' | 'groups' | 'circularShift' | 'kept';
  nullColumn: string;
  draws: string;
  /** Numbers that cannot be read yet are NaN here. */
  controls: readonly ControlRecipe[];
  views: readonly ViewRecipe[];
  seed: string;
  /** The recipe that this one repeats; parts that the form cannot express are taken from it as they are. */
  from: Recipe | null;
}

/** Rows of the form; a check belongs to one of them. */
export type RecipeRowKey =
  | 'label'
  | 'trials'
  | 'units'
  | 'window'
  | 'estimator'
  | 'folds'
  | 'nuisance'
  | 'null'
  | 'controls'
  | 'views'
  | 'seed';
