import argon2 from 'argon2';

/**
 * argon2id with 19 MiB, 2 passes, 1 lane: the smallest setting that OWASP's password storage cheat sheet names
 * (value from memory). About 30 ms here; more memory would let a few sign-ins at once crowd out the web server.
 */
export const passwordParameters = {
  type: argon2.argon2id,
  memoryCost: 19_456,
  timeCost: 2,
  parallelism: 1,
} as const;
