import { z } from 'zod';
import { idSchema } from './common';

/** The parameters of a path that names one thing: …/{id}. */
export const idParamsSchema = z.strictObject({ id: idSchema });
