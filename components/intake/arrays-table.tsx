'use client';

import { PickSelect } from '@/components/ui/pick-select';
import { arrayKey } from '@/lib/client/intake/array-key';
import type { ArrayUse } from '@/lib/client/intake/array-use';
import { codeOfUse } from '@/lib/client/intake/code-of-use';
import type { IntakeDraft } from '@/lib/client/intake/intake-draft';
import { listUses } from '@/lib/client/intake/list-uses';
import type { StoredFile } from '@/lib/contracts/file';
import { formatShape } from '@/lib/format/format-shape';
import { formatValue } from '@/lib/format/format-value';

const mostShown = 200;

/** The first values, long fractions cut to four figures: enough to recognise an array by. */
function sampleWords(sample: readonly string[] | undefined): string {
  const short = (value: string) =>
    value.length > 7 && value.trim() !== '' && Number.isFinite(Number(value))
      ? formatValue(Number(value))
      : value;
  return (sample ?? []).slice(0, 6).map(short).join(' ');
}

/** The arrays that the files hold, and what each is taken for; any word of the last column can be changed. */
export function ArraysTable({
  files,
  draft,
  onUse,
}: {
  files: readonly StoredFile[];
  draft: IntakeDraft;
  onUse: (key: string, use: ArrayUse) => void;
}) {
  const lines = files.flatMap((file) =>
    file.arrays.map((array, index) => ({ file, array, isFirst: index === 0 })),
  );
  return (
    <>
      <div className="scroll" tabIndex={0} role="region" aria-label="Arrays found, table">
        <table className="arrays">
          <caption className="vh">Arrays found</caption>
          <thead>
            <tr>
              <th scope="col">File</th>
              <th scope="col">Path</th>
              <th scope="col">Type</th>
              <th scope="col" className="num">
                Shape
              </th>
              <th scope="col">First values</th>
              <th scope="col" className="use-column">
                Use as
              </th>
            </tr>
          </thead>
          <tbody>
            {lines.slice(0, mostShown).map(({ file, array, isFirst }) => {
              const key = arrayKey(file.id, array.path);
              const use = draft.uses[key] ?? { kind: 'unused' as const };
              const options = listUses(array, file.format);
              const code = codeOfUse(use);
              const chosen = options.some((option) => option.value === code)
                ? options
                : [...options, { value: code, text: code, use }];
              return (
                <tr key={key} className={use.kind === 'unused' ? 'flush out' : 'flush'}>
                  <td>{isFirst ? <span className="n">{file.name}</span> : null}</td>
                  <td>
                    <code>{array.path || '(whole file)'}</code>
                  </td>
                  <td className="quiet">{array.dtype}</td>
                  <td className="n">{formatShape(array.shape)}</td>
                  <td>
                    <code className="quiet sample">{sampleWords(array.sample)}</code>
                  </td>
                  <td>
                    {options.length > 1 ? (
                      <PickSelect
                        small
                        label={`Use ${array.path || file.name} as`}
                        value={code}
                        options={chosen}
                        onChange={(value) => {
                          const option = chosen.find((candidate) => candidate.value === value);
                          if (option) onUse(key, option.use);
                        }}
                      />
                    ) : (
                      <span className="quiet">not used</span>
                    )}
                  </td>
                </tr>
              );
            })}
          </tbody>
        </table>
      </div>
      {lines.length > mostShown ? (
        <p className="cap">
          The first {mostShown} of {lines.length} arrays are shown.
        </p>
      ) : null}
    </>
  );
}
