import { z } from 'zod';

/** What our session token says beyond Auth.js's own claims; it travels in the token's `claims`. */
export const sessionClaimsSchema = z.strictObject({
  userId: z.uuid(),
  labId: z.uuid(),
  signInId: z.uuid(),
  epoch: z.number().int(),
  /** Seconds since 1970. */
  signedInAt: z.number().int(),
});
export type SessionClaims = z.infer<typeof sessionClaimsSchema>;
