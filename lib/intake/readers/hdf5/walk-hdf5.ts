import type { Problem } from '@/lib/contracts/problem';
import { IntakeRefusal } from '@/lib/intake/intake-refusal';
import type { MountedHdf5 } from '@/lib/intake/readers/hdf5/mount-hdf5';

const MAX_DEPTH = 24;
const MAX_OBJECTS = 50_000;

/** A group or dataset of a file, by its path from the root. */
export interface Hdf5Object {
  path: string;
  kind: 'group' | 'dataset';
}

/**
 * Lists all groups and datasets. Links to other files are refused; links within the file are left aside, since what they
 * lead to is listed where it is.
 */
export function walkHdf5(
  { module, fileId }: MountedHdf5,
  skip: (path: string) => boolean,
): { objects: Hdf5Object[]; problems: Problem[] } {
  const objects: Hdf5Object[] = [];
  const problems: Problem[] = [];
  const visit = (group: string, depth: number): void => {
    if (depth > MAX_DEPTH)
      throw new IntakeRefusal(
        'hdf5-depth',
        `Groups are nested more than ${MAX_DEPTH} deep.`,
        'Send a file with fewer levels.',
        { path: group },
      );
    for (const name of module.get_names(fileId, group, false)) {
      const path = group === '/' ? `/${name}` : `${group}/${name}`;
      if (skip(path)) continue;
      if (objects.length >= MAX_OBJECTS)
        throw new IntakeRefusal(
          'hdf5-objects',
          `The file holds more than ${MAX_OBJECTS} groups and arrays.`,
          'Send only those of the session.',
        );
      // The library answers with an empty object for any other kind of link.
      if ('filename' in module.get_external_link(fileId, path))
        throw new IntakeRefusal(
          'hdf5-external-link',
          `“${path}” is a link to another file. Such links are never followed.`,
          'Copy the data into the file.',
          { path },
        );
      if (module.get_symbolic_link(fileId, path) !== null) {
        problems.push({
          code: 'hdf5-link',
          severity: 'notes',
          message: `“${path}” is a link within the file and is left aside.`,
          place: { path },
        });
        continue;
      }
      const type = module.get_type(fileId, path);
      if (type === module.H5G_GROUP) {
        objects.push({ path, kind: 'group' });
        visit(path, depth + 1);
      } else if (type === module.H5G_DATASET) objects.push({ path, kind: 'dataset' });
    }
  };
  visit('/', 0);
  return { objects, problems };
}
