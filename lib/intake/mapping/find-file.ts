import { IntakeRefusal } from '@/lib/intake/intake-refusal';
import type { SourceFile, SourceFiles } from '@/lib/intake/mapping/source-files';

/** The file of that id, or a refusal that says which part of the mapping asked for it. */
export function findFile(files: SourceFiles, fileId: string, role: string): SourceFile {
  const found = files.get(fileId);
  if (found === undefined)
    throw new IntakeRefusal(
      'file-not-found',
      `The mapping takes ${role} from a file that this session does not have.`,
      'Choose one of the session’s files.',
    );
  return found;
}
