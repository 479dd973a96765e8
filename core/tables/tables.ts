/** All published tables that the engine needs, handed in as one argument (the rows live in `data/`). */

import type { Practice } from '../job/job.ts';
import type { ChemistryTables } from './chemistryTables.ts';
import type { ConductorTables } from './conductorTables.ts';
import type { DeviceTables } from './deviceTables.ts';
import type { PracticeTable } from './practiceTable.ts';

export interface Tables {
  readonly conductors: ConductorTables;
  readonly chemistry: ChemistryTables;
  readonly devices: DeviceTables;
  readonly practices: Readonly<Record<Practice, PracticeTable>>;
}
