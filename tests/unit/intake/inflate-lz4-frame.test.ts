import { expect, it } from 'vitest';
import { inflateLz4Frame } from '@/lib/intake/readers/columns/inflate-lz4-frame';

// Put together by hand from the published frame and block formats: four literals, a match that overlaps itself, five literals.
const block = [0x44, ...Buffer.from('abcd'), 4, 0, 0x50, ...Buffer.from('vwxyz')];
const frame = (blocks: number[]): Uint8Array =>
  Uint8Array.from([0x04, 0x22, 0x4d, 0x18, 0x60, 0x40, 0x82, ...blocks]);
const size = (n: number, isPlain = false): number[] => [n, 0, 0, isPlain ? 0x80 : 0];
const text = (bytes: Uint8Array): string => Buffer.from(bytes).toString();

it('unpacks packed and plain blocks of an LZ4 frame', () => {
  expect(text(inflateLz4Frame(frame([...size(block.length), ...block, 0, 0, 0, 0])))).toBe(
    'abcdabcdabcdvwxyz',
  );
  const plain = [...size(3, true), ...Buffer.from('raw')];
  expect(text(inflateLz4Frame(frame([...plain, ...size(block.length), ...block, 0, 0, 0, 0])))).toBe(
    'rawabcdabcdabcdvwxyz',
  );
});

it('refuses frames of another kind or cut short', () => {
  expect(() => inflateLz4Frame(Uint8Array.from([1, 2, 3, 4, 5, 6, 7, 8]))).toThrow('not an LZ4 frame');
  expect(() => inflateLz4Frame(frame([...size(50), ...block]))).toThrow('cut short');
});
