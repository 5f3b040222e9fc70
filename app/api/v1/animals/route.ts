import { idSchema, pageOf, pageQuerySchema } from '@/lib/contracts/common';
import { animalSchema, createAnimalSchema } from '@/lib/contracts/lab';
import { route } from '@/lib/http/route';
import { createAnimal } from '@/lib/services/animals/create-animal';
import { listAnimals } from '@/lib/services/animals/list-animals';

export const GET = route({
  access: 'lab',
  action: 'animal.read',
  summary: "A study's animals, or all of the lab's, newest first",
  query: pageQuerySchema.extend({ studyId: idSchema.optional() }),
  returns: pageOf(animalSchema),
  handle: ({ ctx, query }) => listAnimals(ctx, query),
});

export const POST = route({
  access: 'lab',
  action: 'animal.create',
  summary: 'A new animal in a study',
  body: createAnimalSchema,
  returns: animalSchema,
  status: 201,
  handle: ({ ctx, body }) => createAnimal(ctx, body),
});
