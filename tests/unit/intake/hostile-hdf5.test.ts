import { describe, expect, it } from 'vitest';
import type { Place } from '@/lib/contracts/problem';
import { inspectFile } from '@/lib/intake/inspect-file';
import { memorySource } from '@/lib/intake/memory-source';
import { openFile } from '@/lib/intake/readers/open-file';
import { allValues, fixture, refusalOf } from './support';

const cases: [name: string, file: string, code: string, place: Place][] = [
  ['a link to another file', 'h5_external_link.h5', 'hdf5-external-link', { path: '/x' }],
  ['values kept in another file', 'h5_external_storage.h5', 'hdf5-external-storage', { path: '/x' }],
  ['a virtual dataset', 'h5_virtual.h5', 'hdf5-virtual', { path: '/v' }],
  ['a chunk of 32 MiB', 'h5_chunk.h5', 'hdf5-chunk', { path: '/x' }],
  ['a terabyte that was never written', 'h5_unwritten.h5', 'hdf5-bomb', { path: '/x' }],
  ['groups 40 deep', 'h5_deep.h5', 'hdf5-depth', { path: '/g'.repeat(25) }],
  ['a group that holds its own root', 'h5_cycle.h5', 'hdf5-depth', { path: '/a/back'.repeat(12) + '/a' }],
  ['groups without arrays', 'h5_groups.h5', 'hdf5-empty', {}],
];

describe('hostile HDF5 files', () => {
  for (const [name, file, code, place] of cases)
    it(`${name}: ${code}`, async () => {
      const refusal = await refusalOf(fixture(`files/${file}`));
      expect(refusal?.code).toBe(code);
      expect(refusal?.place).toEqual(place);
    });

  it('an array behind an unknown filter is left aside with a remark, the others are read', async () => {
    const found = await inspectFile(memorySource(fixture('files/h5_lzf.h5')), 'f');
    expect(found.state).toBe('readable');
    expect(found.arrays.map((array) => array.path)).toEqual(['/y']);
    expect(found.problems).toMatchObject([{ code: 'hdf5-left-aside', place: { path: '/x' } }]);
  });

  it('truncations and flipped bytes are read or refused, none crashes', { timeout: 60_000 }, async () => {
    const whole = fixture('files/h5_types.h5');
    for (let at = 8; at < whole.length; at += 257)
      expect(await refusalOf(whole.slice(0, at)), `${at} bytes`).not.toBeNull();
    const codes = new Set<string>();
    for (let at = 9; at < whole.length; at += 131) {
      const flipped = Uint8Array.from(whole);
      flipped[at] ^= 0xff;
      const refusal = await refusalOf(flipped);
      if (refusal) codes.add(refusal.code);
    }
    expect(codes.size).toBeGreaterThan(1);
  });
});

it('HDF5 types are read as h5py wrote them', async () => {
  const file = await openFile(memorySource(fixture('files/h5_types.h5')));
  const values = async (path: string) => allValues(file.arrays.find((array) => array.path === path)!);
  expect(await values('/be')).toEqual(Array.from({ length: 12 }, (_, i) => i));
  expect(await values('/half')).toEqual([0, 1, 2, 3, 4, 5]);
  expect(await values('/flags')).toEqual([1, 0, 1]);
  expect(await values('/words')).toEqual(['a', 'bé']);
  expect(await values('/fixed')).toEqual(['ab', 'c']);
  expect(await values('/one')).toEqual([3.5]);
  expect((await values('/gz')).reduce((sum: bigint, value) => sum + BigInt(value), 0n)).toBe(499_500n);
  file.close();
});
