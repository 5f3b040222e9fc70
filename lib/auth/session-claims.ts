import { z } from 'zod';

/** What our session token says beyond Auth.js's own claims. */
export const sessionClaimsSchema = z.object({
  sub: z.uuid(),
  labId: z.uuid(),
  signInId: z.uuid(),
  epoch: z.number().int(),
  signedInAt: z.number().int(),
});
export type SessionClaims = z.infer<typeof sessionClaimsSchema>;
