import { animalSchema, changeAnimalSchema } from '@/lib/contracts/lab';
import { idParamsSchema } from '@/lib/contracts/params';
import { route } from '@/lib/http/route';
import { changeAnimal } from '@/lib/services/animals/change-animal';
import { getAnimal } from '@/lib/services/animals/get-animal';

export const GET = route({
  access: 'lab',
  action: 'animal.read',
  summary: 'One animal',
  params: idParamsSchema,
  returns: animalSchema,
  handle: ({ ctx, params }) => getAnimal(ctx, { animalId: params.id }),
});

export const PATCH = route({
  access: 'lab',
  action: 'animal.change',
  summary: "Change an animal's facts",
  params: idParamsSchema,
  body: changeAnimalSchema,
  requiresVersion: true,
  returns: animalSchema,
  handle: ({ ctx, params, body, ifVersion }) =>
    changeAnimal(ctx, { animalId: params.id, ifVersion, change: body }),
});
