/** What conductors withstand in a short circuit, parsed once from the rows beside this file. */
import type { WithstandTables } from '../../core/api.ts';
import { readRows } from '../chemistry/rows.ts';
import { constant } from './constants.ts';
import { clauseFigure } from './figures.ts';
import withstandCsv from './withstand.csv?raw';

export const withstand: WithstandTables = {
  rows: readRows('withstand.csv', withstandCsv).map((row) => ({
    metal: row.oneOf('metal', ['copper', 'aluminium']),
    insulation: row.oneOf('insulation', ['thermoplastic', 'thermosetting', 'rubber', 'silicone']),
    insulationDegC: row.number('insulationDegC'),
    finalDegC: row.number('finalDegC'),
    fromMm2: row.optionalNumber('fromMm2') ?? 0,
    toMm2: row.optionalNumber('toMm2') ?? Number.POSITIVE_INFINITY,
    k: clauseFigure(row, 'k'),
  })),
  constants: {
    copper: { c: constant('copper-withstand'), zeroDegC: constant('copper-withstand-zero') },
    aluminium: { c: constant('aluminium-withstand'), zeroDegC: constant('aluminium-withstand-zero') },
  },
  plainFinalDegC: constant('withstand-plain-final'),
  largeFinalDegC: constant('withstand-large-final'),
  largeFromMm2: constant('withstand-large-from'),
  longestS: constant('withstand-longest'),
};
