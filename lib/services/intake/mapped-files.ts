import type { Database } from '@/db/connection';
import { findSessionFiles, type FileRow } from '@/db/repositories/files';
import type { Intake } from '@/lib/contracts/intake';
import { AppError, type FieldFault } from '@/lib/errors/app-error';

/** The files that a mapping reads from: all must belong to the session and be readable. */
export async function mappedFiles(
  q: Database,
  labId: string,
  sessionId: string,
  intake: Intake,
): Promise<FileRow[]> {
  const wanted: { pointer: string; fileId: string }[] = [
    { pointer: '/counts/fileId', fileId: intake.counts.fileId },
    { pointer: '/trials/fileId', fileId: intake.trials.fileId },
    ...(intake.units ? [{ pointer: '/units/fileId', fileId: intake.units.fileId }] : []),
    ...(intake.stimulus
      ? [{ pointer: '/stimulus/velocity/fileId', fileId: intake.stimulus.velocity.fileId }]
      : []),
  ];
  const ids = [...new Set(wanted.map(({ fileId }) => fileId))];
  const rows = await findSessionFiles(q, labId, sessionId, ids);
  const byId = new Map(rows.map((row) => [row.id, row]));
  const faults = wanted.flatMap(({ pointer, fileId }): FieldFault[] => {
    const row = byId.get(fileId);
    if (row === undefined) return [{ pointer, code: 'no-such-file', detail: 'the session has no such file' }];
    if (row.state === 'readable') return [];
    const detail =
      row.state === 'refused'
        ? `${row.name} was refused`
        : `${row.name} is not read yet: wait until it is readable`;
    return [{ pointer, code: `file-${row.state}`, detail }];
  });
  if (faults.length > 0)
    throw new AppError('invalid-input', `The mapping cannot be read: ${faults[0].detail}.`, { faults });
  return rows;
}
