import { z } from 'zod';
import type { ReadoutResult } from '@/lib/contracts/readout';

const num = z.number().nullish();
const heldOutSchema = z.looseObject({
  r2: num,
  low: num,
  high: num,
  intervalMethod: z.string().nullish(),
  nTrials: num,
});
const powersSchema = z.looseObject({
  powers: z.array(
    z.object({
      size: z.number(),
      draws: z.number(),
      detected: z.number(),
      power: z.number(),
      meanR2: z.number(),
    }),
  ),
});

/** What a control's row and its opened part show. */
export interface ControlNumbers {
  kind: string;
  question: string;
  outcome: ReadoutResult['controls'][number]['outcome'];
  sentence: string;
  r2: number | null;
  interval: { low: number; high: number } | null;
  intervalMethod: string | null;
  nTrials: number | null;
  null: ReadoutResult['null'];
  powers: { size: number; draws: number; detected: number; power: number; meanR2: number }[] | null;
  warning: string | null;
}

/** Reads the loosely shaped parts of a control's result. */
export function controlNumbers(control: ReadoutResult['controls'][number]): ControlNumbers {
  const heldOut = heldOutSchema.safeParse(control.heldOut ?? {});
  const {
    r2 = null,
    low = null,
    high = null,
    intervalMethod = null,
    nTrials = null,
  } = heldOut.success ? heldOut.data : {};
  const powers = powersSchema.safeParse(control.detail);
  const warning = control.detail?.warning;
  return {
    kind: control.kind,
    question: control.question.replace(/“([^”]*)”/g, (_, name: string) => name.replaceAll('_', ' ')),
    outcome: control.outcome,
    sentence: control.sentence,
    r2: r2 ?? null,
    interval: low !== null && high !== null ? { low, high } : null,
    intervalMethod: intervalMethod ?? null,
    nTrials: nTrials ?? null,
    null: control.null,
    powers: powers.success ? powers.data.powers : null,
    warning: typeof warning === 'string' ? warning : null,
  };
}
