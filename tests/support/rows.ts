import { randomBytes } from 'node:crypto';
import { v7 as uuidv7 } from 'uuid';
import { db } from '@/db/connection';
import type { Role } from '@/lib/contracts/lab';

/** Rows as the product would write them, for tests that start in the middle of the story. Each returns its ids. */
export interface LabRows {
  labId: string;
  labName: string;
  userId: string;
  userName: string;
  email: string;
  role: Role;
}

/** A lab with one member. The password hash matches no password: sign in through the real verbs where that matters. */
export async function insertLab(options: { role?: Role; name?: string } = {}): Promise<LabRows> {
  const labId = uuidv7();
  const labName = options.name ?? `Lab ${randomBytes(3).toString('hex')}`;
  await db()('labs').insert({ id: labId, name: labName });
  return { labId, labName, ...(await insertMember(labId, options.role ?? 'lead')) };
}

export async function insertMember(
  labId: string,
  role: Role,
): Promise<{ userId: string; userName: string; email: string; role: Role }> {
  const userId = uuidv7();
  const email = `member-${randomBytes(6).toString('hex')}@lab.test`;
  const userName = `Member ${email.slice(7, 11)}`;
  await db()('users').insert({ id: userId, email, name: userName, password_hash: 'none' });
  await db()('memberships').insert({ lab_id: labId, user_id: userId, role });
  return { userId, userName, email, role };
}

export async function insertStudy(lab: Pick<LabRows, 'labId' | 'userId'>): Promise<string> {
  const id = uuidv7();
  await db()('studies').insert({
    id,
    lab_id: lab.labId,
    name: `Study ${id.slice(-4)}`,
    question: 'Does the population carry the label?',
    created_by: lab.userId,
  });
  return id;
}

export async function insertAnimal(lab: Pick<LabRows, 'labId' | 'userId'>, studyId: string): Promise<string> {
  const id = uuidv7();
  await db()('animals').insert({
    id,
    lab_id: lab.labId,
    study_id: studyId,
    code: `A${id.slice(-6)}`,
    species: 'Mus musculus',
    sex: 'unknown',
    created_by: lab.userId,
  });
  return id;
}

/** A recording session with its study and animal (made unless given). */
export async function insertSession(
  lab: Pick<LabRows, 'labId' | 'userId'>,
  given: { studyId?: string; animalId?: string } = {},
): Promise<{ sessionId: string; studyId: string; animalId: string }> {
  const studyId = given.studyId ?? (await insertStudy(lab));
  const animalId = given.animalId ?? (await insertAnimal(lab, studyId));
  const sessionId = uuidv7();
  await db()('recording_sessions').insert({
    id: sessionId,
    lab_id: lab.labId,
    study_id: studyId,
    animal_id: animalId,
    name: `Session ${sessionId.slice(-4)}`,
    started_at: new Date('2026-03-02T09:30:00.000Z'),
    problems: JSON.stringify([]),
    created_by: lab.userId,
  });
  return { sessionId, studyId, animalId };
}
