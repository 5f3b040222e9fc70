import { z } from 'zod';
import { idSchema, instantSchema, nameSchema, textSchema, versionSchema } from './common';

export const roleSchema = z.enum(['lead', 'analyst', 'experimenter', 'observer']);
export type Role = z.infer<typeof roleSchema>;

export const createStudySchema = z.strictObject({ name: nameSchema, question: textSchema.default('') });
export type CreateStudy = z.infer<typeof createStudySchema>;
export const studySchema = z.strictObject({
  id: idSchema,
  name: z.string(),
  question: z.string(),
  createdAt: instantSchema,
  version: versionSchema,
});
export type Study = z.infer<typeof studySchema>;

/** Only what is named changes. */
export const changeStudySchema = z
  .strictObject({ name: nameSchema, question: textSchema })
  .partial()
  .refine((value) => Object.keys(value).length > 0, { message: 'name at least one field to change' });
export type ChangeStudy = z.infer<typeof changeStudySchema>;

export const sexSchema = z.enum(['female', 'male', 'unknown']);
export const createAnimalSchema = z.strictObject({
  studyId: idSchema,
  code: nameSchema.max(60),
  species: nameSchema,
  sex: sexSchema,
  bornOn: z.iso.date().nullish(),
});
export type CreateAnimal = z.infer<typeof createAnimalSchema>;
export const animalSchema = z.strictObject({
  id: idSchema,
  studyId: idSchema,
  code: z.string(),
  species: z.string(),
  sex: sexSchema,
  bornOn: z.string().nullable(),
  createdAt: instantSchema,
  version: versionSchema,
});
export type Animal = z.infer<typeof animalSchema>;
/** Only what is named changes; an animal stays in its study. */
export const changeAnimalSchema = createAnimalSchema
  .omit({ studyId: true })
  .partial()
  .refine((value) => Object.keys(value).length > 0, { message: 'name at least one field to change' });
export type ChangeAnimal = z.infer<typeof changeAnimalSchema>;

/** What a bearer token may be used for; it never exceeds its maker's present role. */
export const scopeSchema = z.enum(['read', 'intake', 'readouts', 'manage']);
export type Scope = z.infer<typeof scopeSchema>;
export const createTokenSchema = z.strictObject({
  name: nameSchema,
  scopes: z.array(scopeSchema).min(1),
  expiresAt: instantSchema,
});
export type CreateToken = z.infer<typeof createTokenSchema>;
export const createdTokenSchema = z.strictObject({
  id: idSchema,
  token: z.string(),
  name: z.string(),
  scopes: z.array(scopeSchema),
  expiresAt: instantSchema,
});
export const tokenSchema = z.strictObject({
  id: idSchema,
  name: z.string(),
  scopes: z.array(scopeSchema),
  createdAt: instantSchema,
  expiresAt: instantSchema,
  lastUsedAt: instantSchema.nullable(),
  revokedAt: instantSchema.nullable(),
});
export type Token = z.infer<typeof tokenSchema>;
export type CreatedToken = z.infer<typeof createdTokenSchema>;
