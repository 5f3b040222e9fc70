import { v7 } from 'uuid';
import { db } from '@/db/connection';
import { insertReadout, takeReadoutNumber } from '@/db/repositories/readouts';
import { insertInvitation } from '@/db/repositories/invitations';
import { insertSignIn } from '@/db/repositories/sign-ins';
import { inTransaction } from '@/db/transaction';
import { recipeSchema } from '@/lib/contracts/recipe';
import { createFile } from '@/lib/services/files/create-file';
import { createToken } from '@/lib/services/tokens/create-token';
import { makeData, makeSession } from '@/tests/integration/readouts/made-session';
import { insertMember, insertSession, type LabRows } from '@/tests/support/rows';
import { actorOf } from './support';

const data = makeData({ nTrials: 30, nUnits: 4, nBins: 3 });

/** One thing of each kind in a lab; the token belongs to the member. */
export interface Things {
  studyId: string;
  animalId: string;
  sessionId: string;
  emptySessionId: string;
  fileId: string;
  readoutId: string;
  tokenId: string;
  signInId: string;
  invitationId: string;
  memberId: string;
}

/** Makes one of each, with `owner` as the author of the lab's things and `member` as the owner of the token. */
export async function makeThings(owner: LabRows, member: LabRows = owner): Promise<Things> {
  const { sessionId } = await makeSession(data, owner);
  const session = await db()<{ id: string; study_id: string; animal_id: string }>('recording_sessions')
    .where({ id: sessionId })
    .first();
  const { study_id: studyId, animal_id: animalId } = session!;
  const empty = await insertSession(owner, { studyId, animalId });
  const ctx = { actor: actorOf({ ...owner, role: 'lead' }), requestId: v7() };
  const file = await createFile(ctx, { sessionId, name: 'counts.npy', sizeBytes: 10 });
  const token = await createToken(
    { actor: actorOf(member), requestId: v7() },
    { name: 'rig', scopes: ['read'], expiresAt: new Date(Date.now() + 3_600_000).toISOString() },
  );
  return {
    studyId,
    animalId,
    sessionId,
    emptySessionId: empty.sessionId,
    fileId: file.id,
    readoutId: await insertQueuedReadout(owner, sessionId),
    tokenId: token.id,
    signInId: await insertOpenSignIn(member),
    invitationId: await insertOpenInvitation(owner),
    memberId: (await insertMember(owner.labId, 'observer')).userId,
  };
}

async function insertQueuedReadout(owner: LabRows, sessionId: string): Promise<string> {
  const id = v7();
  const version = await db()<{ id: string; session_id: string }>('data_versions')
    .where({ session_id: sessionId })
    .first();
  const recipe = recipeSchema.parse({
    label: 'fraction',
    labelTransform: { kind: 'none' },
    trials: { all: true },
    units: { all: true },
    exclusions: 'none',
    window: { startMs: 0, endMs: 150 },
    features: 'windowMean',
    transform: 'none',
    estimator: { kind: 'leastSquares' },
    folds: { kind: 'stratified', k: 3 },
    nuisance: {},
    null: { kind: 'none' },
    controls: [],
    views: [],
    seed: 1,
  });
  await inTransaction(async (trx) =>
    insertReadout(trx, {
      id,
      labId: owner.labId,
      sessionId,
      dataVersionId: version!.id,
      number: await takeReadoutNumber(trx, owner.labId, sessionId),
      recipe,
      recipeHash: 'c'.repeat(64),
      inputsKey: null,
      authorId: owner.userId,
    }),
  );
  return id;
}

async function insertOpenSignIn(member: LabRows): Promise<string> {
  const id = v7();
  await insertSignIn(db(), {
    id,
    user_id: member.userId,
    lab_id: member.labId,
    agent: 'test',
    address: '127.0.0.1',
    last_seen_at: new Date(),
  });
  return id;
}

async function insertOpenInvitation(owner: LabRows): Promise<string> {
  const id = v7();
  await insertInvitation(db(), {
    id,
    lab_id: owner.labId,
    email: `${id}@lab.test`,
    role: 'observer',
    invited_by: owner.userId,
    expires_at: new Date(Date.now() + 3_600_000),
    created_at: new Date(),
  });
  return id;
}
