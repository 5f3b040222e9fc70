import { v7 } from 'uuid';
import { db } from '@/db/connection';
import { insertLab } from '@/db/repositories/labs';
import { insertMembership, listMemberships } from '@/db/repositories/memberships';
import { setPasswordHash, findUserByEmail, insertUser } from '@/db/repositories/users';
import { inTransaction } from '@/db/transaction';
import { hashPassword } from '@/lib/auth/hash-password';
import { verifyPassword } from '@/lib/auth/verify-password';
import type { Role } from '@/lib/contracts/lab';
import type { Ctx } from '@/lib/services/context';

interface LabPlan {
  name: string;
  members: readonly { role: Role; email: string; name: string }[];
}

/**
 * Makes a demonstration lab with its members, or finds it again. A password other than last time's is taken over.
 * Returns a context per role, as if that member had signed in.
 */
export async function ensureLab(plan: LabPlan, password: string): Promise<Record<string, Ctx>> {
  const lead = await findUserByEmail(db(), plan.members[0].email);
  if (lead === null) {
    const passwordHash = await hashPassword(password);
    await inTransaction(async (trx) => {
      const labId = v7();
      await insertLab(trx, { id: labId, name: plan.name, is_demo: true });
      for (const member of plan.members) {
        const userId = v7();
        await insertUser(trx, {
          id: userId,
          email: member.email,
          name: member.name,
          password_hash: passwordHash,
        });
        await insertMembership(trx, { lab_id: labId, user_id: userId, role: member.role });
      }
    });
  }
  const contexts: Record<string, Ctx> = {};
  for (const member of plan.members) {
    const user = await findUserByEmail(db(), member.email);
    if (user === null) throw new Error(`${member.email} has an account missing from a lab that is there`);
    if (!(await verifyPassword(password, user.password_hash)))
      await setPasswordHash(db(), user.id, await hashPassword(password));
    const [membership] = await listMemberships(db(), user.id);
    contexts[member.role] = {
      requestId: 'demo-seed',
      actor: {
        kind: 'member',
        userId: user.id,
        userName: user.name,
        email: user.email,
        labId: membership.lab_id,
        labName: membership.lab_name,
        role: membership.role,
        scopes: null,
      },
    };
  }
  return contexts;
}
