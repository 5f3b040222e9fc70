import { z } from 'zod';
import { AppError } from '@/lib/errors/app-error';
import { route } from '@/lib/http/route';

/** Addresses under /api that nothing answers: problem+json instead of a page. */
const handler = route({
  access: 'public',
  action: null,
  params: z.looseObject({}),
  query: z.looseObject({}),
  returns: z.void(),
  handle: async () => {
    throw new AppError(
      'not-found',
      'There is no such address in the API. /api/v1/openapi.json lists them all.',
    );
  },
});

export { handler as GET, handler as POST, handler as PUT, handler as PATCH, handler as DELETE };
