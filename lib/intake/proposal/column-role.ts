import type { OfferedArray } from '@/lib/intake/proposal/offered-file';

const UNIT =
  /(?:^|[_ ])(?:unit|cell|neuron|cluster|channel|electrode)s?(?:$|[_ ])|^(?:area|region|depth|probe|layer|isolation|snr)(?:$|[_ ])/i;
const TRIAL =
  /(?:^|[_ ])trials?(?:$|[_ ])|fraction|coherence|speed|direction|contrast|label|block|condition|stim|orientation|pupil|(?:^|[_ ])(?:start|stop|onset|offset)(?:$|[_ ])/i;
const TIME = /^(?:bin[_ ]?)?(?:edges|centers|centres|times?|lags?)(?:[_ ](?:s|ms))?$|^bins?$/i;

/** The last part of an array's path, or its file's name where it has none: what a person would call the column. */
export function columnName(array: Pick<OfferedArray, 'path' | 'fileName'>): string {
  if (array.path === '') return array.fileName.replace(/\.[^.]*$/, '');
  return array.path.split(/[./]/).at(-1) ?? array.path;
}

/** What an array of one axis seems to be a column of, by its name; null where the name tells nothing. */
export function columnRole(array: OfferedArray): 'trial' | 'unit' | 'bin' | null {
  if (array.path.startsWith('/units/')) return 'unit';
  if (array.path.startsWith('/intervals/trials/')) return 'trial';
  const name = columnName(array);
  const folder = /^\/?(trials?|units?)[./]/i.exec(array.path)?.[1].toLowerCase();
  if (folder !== undefined) return folder.startsWith('trial') ? 'trial' : 'unit';
  if (TIME.test(name)) return 'bin';
  const isUnit = UNIT.test(name);
  const isTrial = TRIAL.test(name);
  if (isUnit !== isTrial) return isUnit ? 'unit' : 'trial';
  return null;
}
