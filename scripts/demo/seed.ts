/**
 * Sets up the demonstration lab through the same verbs that the routes call, with a worker running. It can be run again at any
 * time: what is there stays, what is missing is added.
 */
import { closeDb } from '@/db/connection';
import { closeRedis } from '@/lib/jobs/connection';
import type { Ctx } from '@/lib/services/context';
import { createAnimal } from '@/lib/services/animals/create-animal';
import { listAnimals } from '@/lib/services/animals/list-animals';
import { createExclusion } from '@/lib/services/exclusions/create-exclusion';
import { listExclusions } from '@/lib/services/exclusions/list-exclusions';
import { cancelReadout } from '@/lib/services/readouts/cancel-readout';
import { createReadout } from '@/lib/services/readouts/create-readout';
import { getReadout } from '@/lib/services/readouts/get-readout';
import { listReadouts } from '@/lib/services/readouts/list-readouts';
import { createSession } from '@/lib/services/sessions/create-session';
import { listSessions } from '@/lib/services/sessions/list-sessions';
import { createStudy } from '@/lib/services/studies/create-study';
import { listStudies } from '@/lib/services/studies/list-studies';
import { bringIn } from './bring-in';
import { demoLab, demoLabel, demoSessions, otherLab } from './demo-lab';
import type { DemoSession } from './demo-lab';
import { ensureLab } from './ensure-lab';
import { waitFor } from './wait-for';

type Contexts = Record<string, Ctx>;

async function main(): Promise<void> {
  const password = process.env.DEMO_PASSWORD;
  if (!password) throw new Error('DEMO_PASSWORD is not set');
  const by = await ensureLab(demoLab, password);
  await ensureLab(otherLab, password);
  const study =
    (await listStudies(by.lead)).items.find((item) => item.name === demoLab.study.name) ??
    (await createStudy(by.lead, demoLab.study));
  const animals = [...(await listAnimals(by.lead, { studyId: study.id })).items];
  for (const animal of demoLab.animals)
    if (!animals.some((item) => item.code === animal.code))
      animals.push(await createAnimal(by.experimenter, { ...animal, studyId: study.id }));

  const sessions = (await listSessions(by.lead, { studyId: study.id })).items;
  for (const plan of demoSessions) {
    const session =
      sessions.find((item) => item.name === plan.name) ??
      (await createSession(by.experimenter, {
        studyId: study.id,
        animalId: animals.find((animal) => animal.code === plan.animal)!.id,
        name: plan.name,
        startedAt: plan.startedAt,
      }));
    if (session.state !== 'ready')
      await bringIn(
        by.experimenter,
        session.id,
        `${plan.animal.toLowerCase()}_${plan.startedAt.slice(5, 10).replace('-', '')}`,
        plan.plan,
      );
    await leaveOut(by, session.id, plan);
    await readOut(by, session.id, plan);
  }
}

async function leaveOut(by: Contexts, sessionId: string, plan: DemoSession): Promise<void> {
  const { version } = await listExclusions(by.lead, { sessionId });
  for (const exclusion of plan.exclusions.slice(version)) {
    const indices = Array.from({ length: exclusion.to - exclusion.from + 1 }, (_, i) => exclusion.from + i);
    await createExclusion(by[exclusion.by], {
      sessionId,
      exclusion: { action: 'leaveOut', [exclusion.kind]: indices, reason: exclusion.reason },
    });
  }
}

async function readOut(by: Contexts, sessionId: string, plan: DemoSession): Promise<void> {
  const made = (await listReadouts(by.lead, { sessionId, limit: 200 })).items.length;
  for (const { by: role, recipe, cancel } of plan.readouts.slice(made)) {
    const { id } = await createReadout(by[role], { sessionId, recipe: { label: demoLabel, ...recipe } });
    if (cancel) {
      await waitFor(
        `Readout ${id}`,
        () => getReadout(by.lead, { readoutId: id }),
        ({ state }) => state !== 'queued',
      );
      await cancelReadout(by[role], { readoutId: id });
    }
    await waitFor(
      `Readout ${id}`,
      () => getReadout(by.lead, { readoutId: id }),
      ({ state }) => state !== 'queued' && state !== 'running',
    );
  }
}

try {
  await main();
} finally {
  closeRedis();
  await closeDb();
}
