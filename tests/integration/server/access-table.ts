import type { Things } from './things';

/**
 * Who may call which route, written down a second time on purpose: l lead, a analyst, e experimenter, o observer;
 * `public` for anybody. `params`, `query` and `body` make a call that would succeed with the given lab's things; an
 * intake is tried with a file that has not arrived, because what it then says is not the matter here.
 */
export interface AccessRow {
  roles: string;
  params?: (things: Things) => Record<string, string>;
  query?: (things: Things) => string;
  body?: (things: Things) => unknown;
  /** Octets instead of JSON. */
  bytes?: Uint8Array;
  ifMatch?: string;
}

const id = (name: keyof Things) => (things: Things) => ({ id: things[name] });
const recipe = () => ({
  recipe: { label: 'fraction', folds: { kind: 'stratified', k: 3 }, null: { kind: 'none' } },
});
const fileAsTable = ({ fileId }: Things) => ({
  counts: { fileId, path: 'counts', axes: ['trial', 'unit', 'bin'] },
  binWidthMs: 20,
  windowStartMs: 0,
  trials: { fileId, columns: { shared: 'shared' } },
  labels: [{ column: 'shared', kind: 'nominal' }],
});

export const accessTable: Record<string, AccessRow> = {
  'GET /api/health': { roles: 'public' },
  'GET /api/v1/me': { roles: 'laeo' },
  'GET /api/v1/studies': { roles: 'laeo' },
  'POST /api/v1/studies': { roles: 'la', body: () => ({ name: 'New study' }) },
  'GET /api/v1/studies/{id}': { roles: 'laeo', params: id('studyId') },
  'PATCH /api/v1/studies/{id}': {
    roles: 'la',
    params: id('studyId'),
    body: () => ({ name: 'Renamed' }),
    ifMatch: '"v1"',
  },
  'GET /api/v1/animals': { roles: 'laeo', query: ({ studyId }) => `?studyId=${studyId}` },
  'POST /api/v1/animals': {
    roles: 'lae',
    body: ({ studyId }) => ({ studyId, code: 'N1', species: 'Mus musculus', sex: 'male' }),
  },
  'GET /api/v1/animals/{id}': { roles: 'laeo', params: id('animalId') },
  'PATCH /api/v1/animals/{id}': {
    roles: 'lae',
    params: id('animalId'),
    body: () => ({ sex: 'female' }),
    ifMatch: '"v1"',
  },
  'GET /api/v1/sessions': { roles: 'laeo', query: ({ studyId }) => `?studyId=${studyId}` },
  'POST /api/v1/sessions': {
    roles: 'lae',
    body: ({ studyId, animalId }) => ({
      studyId,
      animalId,
      startedAt: '2026-03-02T09:00:00Z',
      name: 'Morning',
    }),
  },
  'GET /api/v1/sessions/{id}': { roles: 'laeo', params: id('sessionId') },
  'PATCH /api/v1/sessions/{id}': {
    roles: 'lae',
    params: id('sessionId'),
    body: () => ({ name: 'Evening' }),
    ifMatch: '"v1"',
  },
  'GET /api/v1/sessions/{id}/exclusions': { roles: 'laeo', params: id('sessionId') },
  'POST /api/v1/sessions/{id}/exclusions': {
    roles: 'lae',
    params: id('sessionId'),
    body: () => ({ trials: [1], reason: 'The animal slept' }),
  },
  'GET /api/v1/sessions/{id}/files': { roles: 'laeo', params: id('sessionId') },
  'POST /api/v1/sessions/{id}/files': {
    roles: 'lae',
    params: id('sessionId'),
    body: () => ({ name: 'counts.npy', sizeBytes: 10 }),
  },
  'GET /api/v1/files/{id}': { roles: 'laeo', params: id('fileId') },
  'DELETE /api/v1/files/{id}': { roles: 'lae', params: id('fileId') },
  'PUT /api/v1/files/{id}/parts/{n}': {
    roles: 'lae',
    params: ({ fileId }) => ({ id: fileId, n: '1' }),
    bytes: new Uint8Array(10),
  },
  'POST /api/v1/files/{id}/complete': { roles: 'lae', params: id('fileId') },
  'POST /api/v1/sessions/{id}/intake': { roles: 'lae', params: id('emptySessionId'), body: fileAsTable },
  'GET /api/v1/sessions/{id}/intake/proposal': { roles: 'laeo', params: id('sessionId') },
  'POST /api/v1/sessions/{id}/intake/preview': {
    roles: 'laeo',
    params: id('emptySessionId'),
    body: (things) => ({ intake: fileAsTable(things) }),
  },
  'GET /api/v1/sessions/{id}/data/trials': { roles: 'laeo', params: id('sessionId') },
  'GET /api/v1/sessions/{id}/data/units': { roles: 'laeo', params: id('sessionId') },
  'GET /api/v1/sessions/{id}/readouts': { roles: 'laeo', params: id('sessionId') },
  'POST /api/v1/sessions/{id}/readouts': { roles: 'la', params: id('sessionId'), body: recipe },
  'POST /api/v1/sessions/{id}/readouts/estimate': {
    roles: 'laeo',
    params: id('sessionId'),
    body: recipe,
  },
  'GET /api/v1/readouts/{id}': { roles: 'laeo', params: id('readoutId') },
  'GET /api/v1/readouts/{id}/predictions': { roles: 'laeo', params: id('readoutId') },
  'POST /api/v1/readouts/{id}/cancel': { roles: 'la', params: id('readoutId') },
  'GET /api/v1/events': { roles: 'laeo', query: ({ sessionId }) => `?session=${sessionId}` },
  'GET /api/v1/tokens': { roles: 'laeo' },
  'POST /api/v1/tokens': {
    roles: 'laeo',
    body: () => ({
      name: 'rig',
      scopes: ['read'],
      expiresAt: new Date(Date.now() + 3_600_000).toISOString(),
    }),
  },
  'DELETE /api/v1/tokens/{id}': { roles: 'laeo', params: id('tokenId') },
  'POST /api/v1/me/password': {
    roles: 'laeo',
    body: () => ({ present: 'not the present one', next: 'lantern on the hill' }),
  },
  'GET /api/v1/me/sign-ins': { roles: 'laeo' },
  'DELETE /api/v1/me/sign-ins/{id}': { roles: 'laeo', params: id('signInId') },
  'POST /api/v1/me/sign-ins/end-others': { roles: 'laeo' },
  'GET /api/v1/members': { roles: 'laeo' },
  'PATCH /api/v1/members/{id}': { roles: 'l', params: id('memberId'), body: () => ({ role: 'analyst' }) },
  'DELETE /api/v1/members/{id}': { roles: 'l', params: id('memberId') },
  'GET /api/v1/invitations': { roles: 'l' },
  'POST /api/v1/invitations': { roles: 'l', body: () => ({ email: 'new@lab.test', role: 'observer' }) },
  'DELETE /api/v1/invitations/{id}': { roles: 'l', params: id('invitationId') },
  'POST /api/v1/invitations/look': { roles: 'public', body: () => ({ token: 'nonsense' }) },
  'POST /api/v1/invitations/accept': {
    roles: 'public',
    body: () => ({ token: 'nonsense', name: 'N', password: 'lantern on the hill' }),
  },
  'POST /api/v1/password-resets': { roles: 'public', body: () => ({ email: 'nobody@lab.test' }) },
  'POST /api/v1/password-resets/complete': {
    roles: 'public',
    body: () => ({ token: 'nonsense', password: 'lantern on the hill' }),
  },
  'GET /api/v1/audit': { roles: 'l' },
  'GET /api/v1/audit/verification': { roles: 'l' },
};
