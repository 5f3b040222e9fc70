import type { Problem } from '@/lib/contracts/problem';
import type { SessionData } from '@/lib/intake/session-data';

const ID_NAME = /^unit(?:[_ ]?(?:id|number|no))?$/i;

/** Unit identifiers that are missing or come twice. */
export function checkUnitTable(data: SessionData): Problem[] {
  return data.units
    .filter((column) => ID_NAME.test(column.name))
    .flatMap((column): Problem[] => {
      const seen = new Set<number | string>();
      const path = column.name;
      for (let unit = 0; unit < column.values.length; unit++) {
        const value = column.values[unit];
        if (value === null || (typeof value === 'number' && Number.isNaN(value)))
          return [
            {
              code: 'unit-id-missing',
              severity: 'stops',
              message: `A unit has no entry in “${path}”.`,
              remedy: 'Fill in the unit identifiers.',
              place: { path, unit },
            },
          ];
        if (seen.has(value))
          return [
            {
              code: 'unit-id-duplicate',
              severity: 'warns',
              message: `“${path}” holds ${value} twice; the second place is given.`,
              remedy:
                'Check that no unit was exported twice. If numbers start again on each probe, accept this.',
              place: { path, unit },
            },
          ];
        seen.add(value);
      }
      return [];
    });
}
