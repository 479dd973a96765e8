/** The only door out of core. Hosts, screens and data import from here and from nowhere else inside. */

export type { Banded } from './battery/banded.ts';
export type { CapacityFraction, PeukertExponent, RatedCapacity, TwoWells, WellCharge } from './battery/capacity.ts';
export {
  advanceWells,
  capacityAtRate,
  capacityAtTemperature,
  fullWells,
  largestDischarge,
  peukertExponent,
  peukertHours,
  ratePerHFromReduced,
} from './battery/capacity.ts';
export type { CellCount } from './battery/cells.ts';
export { cellsPerBlock } from './battery/cells.ts';
export type { CellState, Emf } from './battery/emf.ts';
export { emfOfCells, emfOnCurve, emfPerCell } from './battery/emf.ts';
export type { ChargeWindow, CurrentLimits, DischargeVolts, TemperatureWindow } from './battery/limits.ts';
export {
  chargeWindow,
  currentLimits,
  dischargeVolts,
  freezingTemperature,
  limitOf,
  temperatureWindow,
} from './battery/limits.ts';
export type { RcElement, RcModel } from './battery/rc.ts';
export { advanceElements, rcModel, resistanceAfter } from './battery/rc.ts';
export type { ResistanceQuery } from './battery/resistance.ts';
export { arrheniusFactor, defaultResistance } from './battery/resistance.ts';
export type { BatteryBranch, BatteryFault, LoadPoint, Thevenin, TwoPointAnswer } from './battery/shortCircuit.ts';
export { batteryFault, boltedCurrent, twoPointSource } from './battery/shortCircuit.ts';
export type { StringContext, StringFacts, StringSource } from './battery/stringSource.ts';
export { factsOf, stringEmf, stringEmfAtCharge, stringSource } from './battery/stringSource.ts';
export type { GassingCells, Ventilation } from './battery/ventilation.ts';
export { ventilation } from './battery/ventilation.ts';
export type { CheckReport, Finding, Measure, NotChecked, Passed, Severity } from './checks/finding.ts';
export type { Rule as CheckRule, RuleFamily } from './checks/rule.ts';
export { rules as checkRules } from './checks/rules.ts';
export type { CheckRequest } from './checks/runChecks.ts';
export { runChecks } from './checks/runChecks.ts';
export type { Ampacity } from './conductor/ampacity.ts';
export { ampacity } from './conductor/ampacity.ts';
export {
  circularMilDropV,
  circularMilK,
  circularMilsNeeded,
  conductorDropV,
  dropFromMillivoltsV,
  lengthForSameDropM,
  millivoltsPerAmpereMetre,
  pairDropV,
} from './conductor/drop.ts';
export type { Equivalent } from './conductor/equivalent.ts';
export { equivalentIn } from './conductor/equivalent.ts';
export type { AmpacityContext, AmpacityFactor, FactorKind, RatedConductor } from './conductor/rating.ts';
export type { ConductorResistance, ConductorRun, ResistanceContext } from './conductor/resistance.ts';
export { conductorResistance, resistanceAt, resistanceTo20 } from './conductor/resistance.ts';
export type { Missing } from './conductor/size.ts';
export { areaOf, awgDiameterMm, nextSizeUp, sameSize, sizesOf, smallestSize } from './conductor/size.ts';
export type { HeatingLaw } from './conductor/temperature.ts';
export { heatingLaw, temperatureAt } from './conductor/temperature.ts';
export type { Bounds, Field, Fields, Rule } from './job/field.ts';
export type { Issue, IssueCode, Result } from './job/issue.ts';
export { Defect } from './job/issue.ts';
export type {
  CheckedJob,
  DemandRow,
  JunctionNote,
  OperatingCase,
  Practice,
  Reading,
  Settings,
  Site,
  Targets,
} from './job/job.ts';
export { caseById, partsInCase, withPractice } from './job/job.ts';
export { currentVersion } from './job/migrate.ts';
export { nearestNameHint } from './job/nearestName.ts';
export { checkJob, mostParts, parseJob } from './job/parseJob.ts';
export type {
  Chemistry,
  JunctionId,
  Metal,
  Origin,
  Part,
  PartId,
  PartKind,
  Run,
  Stranding,
  StringPart,
} from './job/part.ts';
export { cablesOfPair, junctionsOf, originOf } from './job/part.ts';
export { partFields } from './job/partFields.ts';
export { largestTextLength } from './job/readJson.ts';
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
export { missingFigures } from './network/figures.ts';
export type { SolvedCircuit } from './network/operatingPoint.ts';
export { operatingPoint, solveCircuit } from './network/operatingPoint.ts';
export type { Sensitivity, Target } from './network/sensitivity.ts';
export { sensitivities } from './network/sensitivity.ts';
export type { Thevenin as TheveninSource } from './network/thevenin.ts';
export { theveninAt } from './network/thevenin.ts';
export type { ResistanceChange, WhatIf } from './network/whatIf.ts';
export { whatIf } from './network/whatIf.ts';
export { buildReport } from './report/buildReport.ts';
export type {
  Block,
  CautionBlock,
  Cell,
  Column,
  CoverBlock,
  EntryBlock,
  Fact,
  FactsBlock,
  FigureBlock,
  HeadingBlock,
  ListBlock,
  Paper,
  ParagraphBlock,
  ReportDocument,
  Shape,
  SourcesBlock,
  Stroke,
  TableBlock,
  Tone,
} from './report/document.ts';
export type { ReportInput, ReportOptions } from './report/input.ts';
export type { ArrayConditions, ArrayCurve } from './solar/arrayCurve.ts';
export { arrayCurve, currentAt, maximumPower, openCircuitV, shortCircuitA } from './solar/arrayCurve.ts';
export type {
  CellResistance,
  ChemistryTables,
  EmfCurve,
  EmfPoint,
  FactorPoint,
  LimitQuantity,
  ModelParameter,
  Spread,
} from './tables/chemistryTables.ts';
export type {
  AmpacityRow,
  AmpacityTable,
  BareMetal,
  BoatAmpacity,
  CircularMilConstant,
  ConductorTables,
  FactorBand,
  IecAmpacity,
  MetalConstants,
  MetricResistanceRow,
  UsLandAmpacity,
  UsResistanceRow,
} from './tables/conductorTables.ts';
export type { BreakerInterruptRow, DeviceTables, RatingSeries, TypicalInterrupt } from './tables/deviceTables.ts';
export type { Figure, PracticeTable, SmallestConductor, UnfusedLength } from './tables/practiceTable.ts';
export type { Basis, Status } from './tables/status.ts';
export type { Tables } from './tables/tables.ts';
export type { ConductorSize } from './units/conductorSize.ts';
export { parseSize, sizeText } from './units/conductorSize.ts';
export { formatQuantity } from './units/formatQuantity.ts';
export { fahrenheitText, feetText } from './units/imperial.ts';
export { fixedText, numberText } from './units/numberText.ts';
export type { Parsed } from './units/parsed.ts';
export { quoted } from './units/parsed.ts';
export { parseQuantity } from './units/parseQuantity.ts';
export type { UnitName } from './units/unitName.ts';
export { describeUnit, unitKinds } from './units/unitName.ts';
