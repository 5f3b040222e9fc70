import type { OfferedArray } from '@/lib/intake/proposal/offered-file';

const UNIT =
  /(?:^|[_ ])(?:unit|cell|neuron|cluster|channel|electrode)s?(?:$|[_ ])|^(?:area|region|depth|probe|layer|isolation|snr)(?:$|[_ ])/i;
const TRIAL =
  /(?:^|[_ ])trials?(?:$|[_ ])|fraction|coherence|speed|direction|contrast|label|block|condition|stim|orientation|pupil|(?:^|[_ ])(?:start|stop|onset|offset)(?:$|[_ ])/i;
const TIME = /^(?:bin[_ ]?)?(?:edges|centers|centres|times?|lags?)(?:[_ ](?:s|ms))?$|^bins?$/i;

/** What an array of one axis seems to be a column of, by its name; null where the name tells nothing. */
export function columnRole(array: OfferedArray): 'trial' | 'unit' | 'bin' | null {
  const name = array.path === '' ? array.fileName.replace(/\.[^.]*$/, '') : array.path;
  if (TIME.test(name)) return 'bin';
  const isUnit = UNIT.test(name);
  const isTrial = TRIAL.test(name);
  if (isUnit !== isTrial) return isUnit ? 'unit' : 'trial';
  return null;
}
