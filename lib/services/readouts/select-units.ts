import type { Recipe } from '@/lib/contracts/recipe';
import { matchConditions } from '@/lib/services/readouts/match-conditions';
import type { RecipeFault } from '@/lib/services/readouts/recipe-fault';
import type { SessionTables } from '@/lib/services/readouts/session-tables';

/** The units that take part, ascending: those that the recipe chooses, less the excluded ones. The label plays no part. */
export function selectUnits(
  { units }: Recipe,
  tables: SessionTables,
  excluded: ReadonlySet<number>,
): { unitIndex: Int32Array } | { faults: RecipeFault[] } {
  const rows = new Uint8Array(tables.nUnits).fill('ids' in units ? 0 : 1);
  const faults: RecipeFault[] = [];
  if ('ids' in units)
    units.ids.forEach((unit, at) => {
      if (unit < tables.nUnits) rows[unit] = 1;
      else
        faults.push({
          pointer: `/recipe/units/ids/${at}`,
          code: 'no-such-unit',
          message: `There is no unit ${unit}: the session has ${tables.nUnits}, counted from 0.`,
        });
    });
  if ('rule' in units) {
    const { minRateHz, minPresence, where } = units.rule;
    const facts = tables.unitFacts;
    if (facts === null && (minRateHz !== undefined || minPresence !== undefined))
      throw new Error('a unit rule by rate or presence needs the rates of the units');
    const meets = matchConditions(where ?? [], tables.units, tables.nUnits, '/recipe/units/rule/where');
    faults.push(...meets.faults);
    for (let unit = 0; unit < tables.nUnits; unit++) {
      const isSlow = minRateHz !== undefined && facts!.meanRateHz[unit] < minRateHz;
      const isAbsent = minPresence !== undefined && facts!.presence[unit] < minPresence;
      if (isSlow || isAbsent || !meets.rows[unit]) rows[unit] = 0;
    }
  }
  if (faults.length > 0) return { faults };
  const included = [...rows.keys()].filter((unit) => rows[unit] && !excluded.has(unit));
  if (included.length === 0)
    return {
      faults: [{ pointer: '/recipe/units', code: 'no-units', message: 'No unit is left to read from.' }],
    };
  return { unitIndex: Int32Array.from(included) };
}
