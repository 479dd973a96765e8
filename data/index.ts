/** All published tables, as the one argument that the engine takes. */
import type { Tables } from '../core/api.ts';
import { chemistryTables } from './chemistry/chemistry.ts';
import { conductors } from './conductors/conductors.ts';
import { devices } from './devices/devices.ts';
import { practices } from './practices/practices.ts';

export const tables: Tables = { conductors, chemistry: chemistryTables, devices, practices };
