import type { ErrorCode } from '@/lib/errors/app-error';

/** What each error code means to a person or a script, and what to do. */
export const problemHelp: Readonly<Record<ErrorCode, { meaning: string; steps: string[] }>> = {
  'malformed-request': {
    meaning:
      'The request could not be read at all: broken JSON, bytes that are not UTF-8, or a broken header.',
    steps: [
      'Send one JSON object, encoded as UTF-8, without a byte order mark.',
      'The answer’s detail says where the reading stopped.',
      'On the sign-in page this can mean that the site is reached by an address that it does not know: whoever runs it sets PUBLIC_URL.',
    ],
  },
  unauthenticated: {
    meaning:
      'Nobody is signed in, or the token is unknown, revoked, past its end, or its maker has left the lab.',
    steps: [
      'In a browser, sign in again.',
      'In a script, send the header Authorization: Bearer and a token from POST /api/v1/tokens.',
    ],
  },
  forbidden: {
    meaning: 'You are signed in, but your role in the lab, or the token’s scopes, do not include this.',
    steps: [
      'GET /api/v1/me lists what you may do.',
      'Ask a lead of the lab, or make a token with the scope that the detail names.',
      'A browser request that does not come from a page of this site is refused with this code as well.',
    ],
  },
  'not-found': {
    meaning:
      'There is nothing at this address, or it belongs to another lab. The two look the same on purpose.',
    steps: ['Check the id and the path.', 'Check which lab you or your token belong to: GET /api/v1/me.'],
  },
  conflict: {
    meaning: 'The present state does not allow this, or an Idempotency-Key has been used before.',
    steps: [
      'Read the thing again; its state tells what is possible now.',
      'Give every new request an Idempotency-Key of its own, and repeat a request with the very same body.',
    ],
  },
  'stale-version': {
    meaning: 'Somebody changed this after you read it, so your change was not made.',
    steps: ['Read it again, look at what changed, and repeat your change with the new ETag in If-Match.'],
  },
  'version-required': {
    meaning:
      'A change must name the version that it is made to, so that nobody overwrites another’s change unseen.',
    steps: ['Read the thing first and send its ETag in the header If-Match.'],
  },
  'too-large': {
    meaning: 'The body is larger than this address takes.',
    steps: [
      'Files go up in parts of the size that the upload names.',
      'Given permutations above 8 MiB are brought in as a file and named by fileId and path.',
    ],
  },
  'unsupported-format': {
    meaning: 'The body is not of a kind that is understood here.',
    steps: ['Send JSON with the header Content-Type: application/json. Parts of files are sent as octets.'],
  },
  'invalid-input': {
    meaning: 'The request could be read, but some values are not valid. Nothing was changed.',
    steps: [
      'The list errors names every fault at once, each with a JSON pointer to the field.',
      'The contract of every field is in /api/v1/openapi.json.',
    ],
  },
  'rate-limited': {
    meaning: 'There were too many requests, or too many tries to sign in, in a short time.',
    steps: [
      'Wait for the seconds that Retry-After names.',
      'The headers RateLimit-Limit, RateLimit-Remaining and RateLimit-Reset tell how much is left.',
    ],
  },
  internal: {
    meaning: 'Something went wrong on our side. It has been logged.',
    steps: ['Try once more.', 'If it stays, tell whoever runs this site the request id from the answer.'],
  },
  unavailable: {
    meaning: 'The database, the file store or another part is away just now. Nothing was changed.',
    steps: [
      'Wait for the seconds that Retry-After names and send the same request again.',
      'With an Idempotency-Key it is carried out once, however often you send it.',
      '/api/health says which part is away.',
    ],
  },
};
