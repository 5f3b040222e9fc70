import type { CountsAxis } from '@/lib/contracts/intake';

/** Every order in which a counts array of two or three axes can be stored. */
export function axisOrders(nAxes: number): CountsAxis[][] {
  const all: CountsAxis[] = nAxes === 2 ? ['trial', 'unit'] : ['trial', 'unit', 'bin'];
  const permute = (rest: CountsAxis[]): CountsAxis[][] =>
    rest.length <= 1
      ? [rest]
      : rest.flatMap((axis) =>
          permute(rest.filter((other) => other !== axis)).map((tail) => [axis, ...tail]),
        );
  return permute(all);
}
