/** The only door out of core. Hosts, screens and data import from here and from nowhere else inside. */

export type { Issue, IssueCode, Result } from './job/issue.ts';
export { Defect } from './job/issue.ts';
export type { CheckedJob, OperatingCase, Practice, Reading, Settings, Site, Targets } from './job/job.ts';
export { caseById, partsInCase } from './job/job.ts';
export { checkJob, parseJob } from './job/parseJob.ts';
export type { Chemistry, ConductorSize, JunctionId, Origin, Part, PartId, PartKind } from './job/part.ts';
export { cablesOfPair, junctionsOf, originOf } from './job/part.ts';
export type {
  Assumption,
  BatteryModel,
  Collapse,
  GraphRemark,
  OperatingPoint,
  PartAnswer,
  Proof,
} from './network/answer.ts';
export type { CircuitRequest } from './network/circuit.ts';
export { operatingPoint } from './network/operatingPoint.ts';
export type { ChemistryTables } from './tables/chemistryTables.ts';
export type { ConductorTables } from './tables/conductorTables.ts';
export type { DeviceTables } from './tables/deviceTables.ts';
export type { PracticeTable } from './tables/practiceTable.ts';
export type { Basis, Status } from './tables/status.ts';
export type { Tables } from './tables/tables.ts';
