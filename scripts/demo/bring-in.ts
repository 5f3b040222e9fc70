import type { Ctx } from '@/lib/services/context';
import { completeFile } from '@/lib/services/files/complete-file';
import { createFile } from '@/lib/services/files/create-file';
import { getFile } from '@/lib/services/files/get-file';
import { putPart } from '@/lib/services/files/put-part';
import { submitIntake } from '@/lib/services/intake/submit-intake';
import { getSession } from '@/lib/services/sessions/get-session';
import type { MadeFile } from './recording-files';
import { recordingFiles } from './recording-files';
import { binMs, makeRecording, windowStartMs } from './make-recording';
import { demoLabel } from './demo-lab';
import type { RecordingPlan } from './recording-plan';
import { waitFor } from './wait-for';

async function upload(ctx: Ctx, sessionId: string, file: MadeFile): Promise<string> {
  const { id, partSizeBytes } = await createFile(ctx, {
    sessionId,
    name: file.name,
    sizeBytes: file.bytes.length,
  });
  for (let number = 1, at = 0; at < file.bytes.length; number += 1, at += partSizeBytes) {
    const part = file.bytes.subarray(at, at + partSizeBytes);
    await putPart(ctx, {
      fileId: id,
      number,
      body: new Blob([Uint8Array.from(part)]).stream(),
      contentLength: part.length,
      sha256: null,
    });
  }
  await completeFile(ctx, { fileId: id });
  const read = await waitFor(
    `Reading ${file.name}`,
    () => getFile(ctx, { fileId: id }),
    ({ state }) => state !== 'reading',
  );
  if (read.state !== 'readable')
    throw new Error(`${file.name} was refused: ${read.problems.map((p) => p.message).join(' ')}`);
  return id;
}

/** Brings one made-up recording in as a rig would: three files, a mapping, and the worker's checks. */
export async function bringIn(ctx: Ctx, sessionId: string, stem: string, plan: RecordingPlan): Promise<void> {
  const files = recordingFiles(makeRecording(plan), stem);
  const countsId = await upload(ctx, sessionId, files.counts);
  const trialsId = await upload(ctx, sessionId, files.trials);
  const unitsId = await upload(ctx, sessionId, files.units);
  await submitIntake(ctx, {
    sessionId,
    counts: { fileId: countsId, path: '', axes: ['trial', 'unit', 'bin'] },
    binWidthMs: binMs,
    windowStartMs,
    trials: {
      fileId: trialsId,
      columns: {
        [demoLabel]: demoLabel,
        realised_fraction: 'realised_fraction',
        speed: 'speed',
        direction: { path: 'direction', type: 'circular', periodDeg: 360 },
        contrast: 'contrast',
        pupil: 'pupil',
        block: 'block',
        trial_start: 'trial_start',
      },
    },
    labels: [
      { column: demoLabel, kind: 'nominal' },
      { column: 'realised_fraction', kind: 'realised' },
    ],
    units: {
      fileId: unitsId,
      columns: { area: { path: 'area', type: 'category' }, depth_um: 'depth_um', isolation: 'isolation' },
    },
    acceptWarnings: true,
  });
  const session = await waitFor(
    `Intake of ${stem}`,
    () => getSession(ctx, { sessionId }),
    ({ state }) => state !== 'checking' && state !== 'empty',
  );
  if (session.state !== 'ready')
    throw new Error(`${stem} ended as ${session.state}: ${session.problems.map((p) => p.message).join(' ')}`);
}
