import { describe, expect, it } from 'vitest';
import type { Chunk } from '@/lib/engine/readout/types';
import { boundedCache } from '@/worker/compute/bounded-cache';
import { scheduleChunks } from '@/worker/compute/chunk-schedule';
import { decodeOutput, encodeOutput } from '@/worker/compute/encode-output';
import { memoryProblem } from '@/worker/compute/memory-problem';
import { progressMeter } from '@/worker/compute/progress-meter';
import { partsFor, splitChunks } from '@/worker/compute/split-chunks';
import { shareArrays } from '@/worker/compute/share-arrays';

const chunk = (id: number, affinity: string, weight = 1): Chunk => ({
  id,
  affinity,
  weight,
  phase: `phase ${affinity}`,
  job: { kind: 'batch', from: id, to: id + 1 },
});

describe('the schedule', () => {
  it('keeps a thread on its group, then gives it one that nobody has begun', () => {
    const schedule = scheduleChunks([
      chunk(0, 'a'),
      chunk(1, 'b'),
      chunk(2, 'a'),
      chunk(3, 'b'),
      chunk(4, 'c'),
    ]);
    const order = [0, 1, 0, 1, 0, 1].map((thread) => schedule.next(thread)?.id ?? null);
    expect(order).toEqual([0, 1, 2, 3, 4, null]);
  });
  it('lets a free thread help where most is left, from the end', () => {
    const schedule = scheduleChunks([chunk(0, 'a'), chunk(1, 'a'), chunk(2, 'a'), chunk(3, 'b')]);
    expect(schedule.next(0)?.id).toBe(0);
    expect(schedule.next(1)?.id).toBe(3);
    expect(schedule.next(1)?.id).toBe(2);
    expect(schedule.next(0)?.id).toBe(1);
    expect(schedule.next(0)).toBeNull();
  });
  it('hands every chunk out once, whatever the threads do', () => {
    const chunks = Array.from({ length: 40 }, (_, id) => chunk(id, `g${id % 7}`, 1 + (id % 5)));
    const schedule = scheduleChunks(chunks);
    const seen: number[] = [];
    for (let turn = 0; ; turn++) {
      const next = schedule.next((turn * 5) % 3);
      if (!next) break;
      seen.push(next.id);
    }
    expect(seen.sort((a, b) => a - b)).toEqual(chunks.map(({ id }) => id));
  });
});

describe('the parts of a large readout', () => {
  const chunks = Array.from({ length: 50 }, (_, id) => chunk(id, `g${id % 5}`, 1 + (id % 3)));
  it('hold every chunk once, in the same way each time, with groups kept together', () => {
    const split = splitChunks(chunks, 4);
    expect(
      split
        .flat()
        .map(({ id }) => id)
        .sort((a, b) => a - b),
    ).toEqual(chunks.map(({ id }) => id));
    expect(splitChunks(chunks, 4)).toEqual(split);
    const weights = split.map((part) => part.reduce((sum, { weight }) => sum + weight, 0));
    expect(Math.max(...weights) - Math.min(...weights)).toBeLessThan(6);
    const groupsOf = split.map((part) => new Set(part.map(({ affinity }) => affinity)).size);
    expect(Math.max(...groupsOf)).toBeLessThan(4);
  });
  it('are none where it is not expected to take long', () => {
    const plan = (seconds: number) => ({ chunks, estimate: { flops: 0, bytes: 0, seconds } });
    expect(partsFor(plan(60), 2, 30)).toBe(1);
    expect(partsFor(plan(61), 2, 30)).toBe(4);
    expect(partsFor(plan(160), 2, 30)).toBe(10);
    expect(partsFor(plan(1e6), 2, 30)).toBe(50);
  });
});

describe('the cache', () => {
  it('lets the least recently used go when it is full', () => {
    const cache = boundedCache(10);
    cache.set('a', 1, 4);
    cache.set('b', 2, 4);
    expect(cache.get('a')).toBe(1);
    cache.set('c', 3, 4);
    expect([cache.get('a'), cache.get('b'), cache.get('c')]).toEqual([1, undefined, 3]);
  });
  it('keeps what is larger than itself until the next comes', () => {
    const cache = boundedCache(10);
    cache.set('large', 1, 50);
    expect(cache.get('large')).toBe(1);
    cache.set('small', 2, 1);
    expect([cache.get('large'), cache.get('small')]).toEqual([undefined, 2]);
  });
});

describe('progress', () => {
  it('goes by the weight of what is done and tells a time left when that means something', () => {
    let now = 0;
    const meter = progressMeter([chunk(0, 'a', 1), chunk(1, 'b', 3)], new Set(), () => now);
    expect(meter.read()).toEqual({ done: 0, total: 1000, phase: 'phase a', secondsLeft: null });
    meter.finished(0);
    now = 2000;
    expect(meter.read()).toMatchObject({ done: 250, secondsLeft: 6 });
  });
  it('counts what an earlier attempt did as done, but not in the speed', () => {
    let now = 0;
    const meter = progressMeter(
      [chunk(0, 'a'), chunk(1, 'b'), chunk(2, 'c'), chunk(3, 'd')],
      new Set([0, 1]),
      () => now,
    );
    expect(meter.read().done).toBe(500);
    meter.finished(2);
    now = 1000;
    expect(meter.read()).toMatchObject({ done: 750, secondsLeft: 1 });
  });
});

describe('shared arrays', () => {
  it('lie in shared memory with the same type and values, one copy each', () => {
    const array = Float64Array.of(1.5, NaN, -0);
    const shared = shareArrays({ a: array, again: [array], name: 'x', counts: Uint8Array.of(1, 2) });
    expect(shared.a.buffer).toBeInstanceOf(SharedArrayBuffer);
    expect([...shared.a]).toEqual([1.5, NaN, -0]);
    expect(shared.again[0]).toBe(shared.a);
    expect(shared.counts).toBeInstanceOf(Uint8Array);
    expect(shared.name).toBe('x');
  });
});

describe('kept parts', () => {
  it('keep every bit', () => {
    const output = { id: 3, values: { r2: 0.1 + 0.2, errors: Float64Array.of(1 / 3, -0, 5e-324) } };
    expect(decodeOutput(encodeOutput(output))).toEqual(output);
  });
});

describe('memory', () => {
  it('is refused with the numbers when it would not fit', () => {
    expect(memoryProblem(10, 10)).toBeNull();
    expect(memoryProblem(25 * 2 ** 30, 8 * 2 ** 30)?.message).toContain('25 GiB');
  });
});
