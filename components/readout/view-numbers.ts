import { z } from 'zod';

const num = z.number().nullable();
const window = { startMs: z.number(), endMs: z.number() };
const quantiles = z.object({ q95: num, max: num }).loose();
const maximum = z.object({ draws: z.number(), smallestP: num, quantiles }).loose().nullable();

const timeCourse = z.looseObject({
  kind: z.literal('timeCourse'),
  widthMs: z.number(),
  stepMs: z.number(),
  windows: z.array(
    z.looseObject({
      ...window,
      r2: num,
      testTrialInterval: z.looseObject({ low: z.number(), high: z.number() }).nullable(),
      p: num,
      pFamily: num,
      nullQ05: num,
      nullQ95: num,
    }),
  ),
  maximumNull: maximum,
});
const generalisation = z.looseObject({
  kind: z.literal('temporalGeneralisation'),
  widthMs: z.number(),
  stepMs: z.number(),
  windows: z.array(z.looseObject(window)),
  r2: z.array(z.array(num)),
  windowsOverlap: z.boolean(),
});
const sizes = z.looseObject({
  kind: z.enum(['populationSize', 'learning']),
  draws: z.number(),
  most: z.number(),
  sizes: z.array(z.looseObject({ size: z.number(), mean: num, q025: num, q975: num, values: z.array(num) })),
});
const singleUnits = z.looseObject({
  kind: z.literal('singleUnits'),
  units: z.array(z.looseObject({ unit: z.number(), r2: num, p: num, pFamily: num, q: num })),
  maximumNull: maximum,
});
const side = z.looseObject({ mean: z.array(z.number()), sd: z.array(z.number()), agreement: num });
const weights = z.looseObject({
  kind: z.literal('weights'),
  weights: side,
  pattern: side,
  units: z.array(z.number()),
  featuresPerUnit: z.number(),
  folds: z.number(),
});

/** A view of a readout as the result holds it. */
export const viewNumbersSchema = z.union([timeCourse, generalisation, sizes, singleUnits, weights]);
export type ViewNumbers = z.infer<typeof viewNumbersSchema>;
export type TimeCourseNumbers = z.infer<typeof timeCourse>;
export type GeneralisationNumbers = z.infer<typeof generalisation>;
export type SizeNumbers = z.infer<typeof sizes>;
export type SingleUnitNumbers = z.infer<typeof singleUnits>;
export type WeightNumbers = z.infer<typeof weights>;
