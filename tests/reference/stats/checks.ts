import { readFileSync } from 'node:fs';
import { fileURLToPath } from 'node:url';

const folder = fileURLToPath(new URL('../../fixtures/checks/', import.meta.url));

/** One reference value of tests/fixtures/checks/checks.json. */
export interface Check<Inputs, Expected> {
  id: string;
  inputs: Inputs;
  expected: Expected;
  source: string;
}

/** A reference value by its id; the caller states the shape that it expects of the file. */
export function check<Inputs, Expected>(id: string): Check<Inputs, Expected> {
  const { checks } = JSON.parse(readFileSync(`${folder}checks.json`, 'utf8')) as {
    checks: Check<Inputs, Expected>[];
  };
  const found = checks.find((one) => one.id === id);
  if (!found) throw new Error(`There is no check ${id}`);
  return found;
}

/** A numeric table of tests/fixtures/checks/data, header left out. */
export function checkTable(file: string): number[][] {
  const lines = readFileSync(`${folder}data/${file}`, 'utf8').trim().split('\n').slice(1);
  return lines.map((line) => line.split(',').map((cell) => Number(cell.replaceAll('"', ''))));
}

/** Two columns of numbers of data/norris.json. */
export function norris(): { x: number[]; y: number[] } {
  return JSON.parse(readFileSync(`${folder}data/norris.json`, 'utf8')) as { x: number[]; y: number[] };
}
