import type { Place } from '@/lib/contracts/problem';

/** Something in a recipe that does not fit the session, told before anything is computed. */
export interface RecipeFault {
  /** JSON pointer into the request body, `/recipe/…`. */
  pointer: string;
  code: string;
  message: string;
  place?: Place;
}
