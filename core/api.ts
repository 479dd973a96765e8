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
export type { ProtectionFigures } from './checks/protectionFigures.ts';
export { protectionFigures } from './checks/protectionFigures.ts';
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
export type { SizeEcho, SizeEchoRequest } from './conductor/sizeEcho.ts';
export { sizeEcho, usualSizes } from './conductor/sizeEcho.ts';
export type { HeatingLaw } from './conductor/temperature.ts';
export { heatingLaw, temperatureAt } from './conductor/temperature.ts';
export type { DrawnPart, DrawnWire, FigurePlace, Surroundings, WireCurrent } from './diagram/drawPart.ts';
export { drawPart, entriesOf, figurePlace, freeSide, lineWeight } from './diagram/drawPart.ts';
export { CHEMISTRY_WORDS, KIND_WORDS } from './diagram/kindWords.ts';
export { minusSide, returnOf } from './diagram/minusSide.ts';
export type { Moved } from './diagram/moveWith.ts';
export { moveBy } from './diagram/moveWith.ts';
export { kindSymbol, partSymbol } from './diagram/partSymbol.ts';
export type { Positions } from './diagram/point.ts';
export { EARTH, GRID } from './diagram/point.ts';
export type { PlaceOf, Pose, TerminalPlace } from './diagram/pose.ts';
export { boxAround, isConductor, roomOf } from './diagram/pose.ts';
export { freePlace, positionsOf } from './diagram/positions.ts';
export type { Entry } from './diagram/routeWire.ts';
export type { Shape, Stroke, Tone } from './diagram/shape.ts';
export type { LaidSurroundings } from './diagram/surroundings.ts';
export { drawParts, surroundingsOf } from './diagram/surroundings.ts';
export { tidyPositions } from './diagram/tidy.ts';
export { ratingWords } from './diagram/wiringWords.ts';
export type { CaseField } from './draft/cases.ts';
export { addCase, removeCase, renameCase, setCase, setInCase } from './draft/cases.ts';
export type { Placing } from './draft/clipboard.ts';
export { copyParts, duplicateParts, pasteParts } from './draft/clipboard.ts';
export { connect, insertInto, parallelString } from './draft/connect.ts';
export type { Draft, Edited, Point, RawPart } from './draft/draft.ts';
export { draftOf, emptyDraft, partsAdded, rawPart, rawParts } from './draft/draft.ts';
export { draftText } from './draft/draftText.ts';
export type { Edit } from './draft/edit.ts';
export { applyEdit, together } from './draft/edit.ts';
export { changeKind, kindsAlike, setField, setOrigin, setRange } from './draft/fields.ts';
export {
  addTap,
  attach,
  detach,
  joinJunctions,
  labelJunction,
  removeTap,
  renameJunction,
  setReference,
} from './draft/junctions.ts';
export type { NewPart, PartFieldsGiven } from './draft/parts.ts';
export { addPart, removeParts, renamePart } from './draft/parts.ts';
export { move, place } from './draft/positions.ts';
export { seedBadLug } from './draft/seedBadLug.ts';
export type { SmallJob } from './draft/smallJob.ts';
export { startSmall } from './draft/startSmall.ts';
export type { Terminal } from './draft/terminals.ts';
export { terminalsOf } from './draft/terminals.ts';
export type { DemandFields } from './draft/top.ts';
export { addDemand, removeDemand, setDemand, setTop } from './draft/top.ts';
export type { BalanceLine } from './explain/balanceLine.ts';
export { balanceLine } from './explain/balanceLine.ts';
export type { JunctionBalance, JunctionCurrent, JunctionRequest } from './explain/junctionBalance.ts';
export { junctionBalance } from './explain/junctionBalance.ts';
export type { PartFigure } from './explain/partFigures.ts';
export { partFigures } from './explain/partFigures.ts';
export { partWorking } from './explain/partWorking.ts';
export type { WalkRequest } from './explain/voltWalk.ts';
export { voltWalk } from './explain/voltWalk.ts';
export type { NoWalk, VoltWalk, WalkChoice, WalkSide, WalkStep, WalkStepKind, WalkTotals } from './explain/walk.ts';
export type { WalkChoicesRequest } from './explain/walkChoices.ts';
export { walkChoices } from './explain/walkChoices.ts';
export type { LossGroup, WalkLoss } from './explain/walkLosses.ts';
export { walkLosses, walkRiseV } from './explain/walkLosses.ts';
export type { FigureOrigin, PartRequest, WorkingLine, WorkingResult } from './explain/workingLine.ts';
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
export type { ListName } from './lists/buildList.ts';
export { buildList } from './lists/buildList.ts';
export type { List } from './lists/list.ts';
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
export { withoutPairs } from './network/wiring.ts';
export type {
  BandPoint,
  Clearing,
  DeviceBand,
  DeviceFault,
  FaultCurrent,
  FaultMethod,
  FaultShare,
  FaultStudy,
  JunctionFault,
} from './protection/answer.ts';
export { ARC_BASIS, ARC_TIME_S, arcEnergy, BURN_CAL_PER_CM2 } from './protection/arcFlash.ts';
export { clearingOf, provenance, timeText } from './protection/clearing.ts';
export { deviceBandOf } from './protection/deviceBand.ts';
export { faultLevel } from './protection/faultLevel.ts';
export type { FaultFigures, FaultRequest } from './protection/faultSources.ts';
export type { DeviceFaultRow, FaultSummary, JunctionFaultRow } from './protection/faultSummary.ts';
export { faultSummary } from './protection/faultSummary.ts';
export type { IsolatingDevice, Isolation } from './protection/isolation.ts';
export { partsThatIsolate } from './protection/isolation.ts';
export { pulseShare, type SurgeAnswer, surgeAgainstMelt } from './protection/pulse.ts';
export { type Selectivity, type SelectivityRequest, selectivityOf } from './protection/selectivity.ts';
export {
  adiabaticTimeS,
  smallestAreaMm2,
  type Withstand,
  type WithstandRequest,
  withstandFactorK,
  withstandOf,
} from './protection/withstand.ts';
export { type BankChange, type BankChangesRequest, bankChanges } from './remedy/bankChanges.ts';
export { EFFORTS } from './remedy/candidate.ts';
export type { FindingPair } from './remedy/comparePractices.ts';
export { comparePractices } from './remedy/comparePractices.ts';
export type { MissingField } from './remedy/missingField.ts';
export { missingField } from './remedy/missingField.ts';
export { costWords, type ProtectionCost, weightOf } from './remedy/protect/cost.ts';
export type { DeviceBeside, DeviceStudy, ProtectionStudy, SurgePoint } from './remedy/protect/deviceStudy.ts';
export { protectionStudy } from './remedy/protect/deviceStudy.ts';
export {
  type FuseWindow,
  type FuseWindowRequest,
  fuseWindowOf,
  type WindowFigures,
  windowFrom,
} from './remedy/protect/fuseWindow.ts';
export type {
  Alternative as ProtectionAlternative,
  ProposedCable,
  ProposedDevice,
  ProtectionProposal,
  ProtectionRequest,
  RunProposal,
  RunVerdict,
} from './remedy/protect/proposal.ts';
export { PROTECTION_RULES, proposeProtection } from './remedy/protect/proposeProtection.ts';
export type { RunRole } from './remedy/protect/runs.ts';
export type { RemedyTrial } from './remedy/remedyTrial.ts';
export type { RemedyRequest } from './remedy/tryRemedy.ts';
export { remedyTrials } from './remedy/tryRemedy.ts';
export { buildReport } from './report/buildReport.ts';
export { answerLine, partName, partNames } from './report/caseWords.ts';
export type { Caution } from './report/cautions.ts';
export { cautionsForPart, cautionTexts } from './report/cautions.ts';
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
  SourcesBlock,
  TableBlock,
} from './report/document.ts';
export type { ReportInput, ReportOptions } from './report/input.ts';
export {
  fieldWords,
  plainFields,
  SEVERITIES,
  SEVERITY_WORDS,
  STATUS_WORDS,
  sentenceCase,
  withoutStatus,
} from './report/wording.ts';
export type { ArrayConditions, ArrayCurve } from './solar/arrayCurve.ts';
export { arrayCurve, currentAt, maximumPower, openCircuitV, shortCircuitA } from './solar/arrayCurve.ts';
export type {
  AtRest,
  BandStudy,
  BankMeasure,
  CycleStep,
  DriftedString,
  DriftMoment,
  DriftRequest,
  DriftStudy,
  FromReadings,
  Joining,
  Layout,
  LayoutStudy,
  LeadStudy,
  OneLoss,
  OneOutStudy,
  SeriesImbalance,
  SharedString,
  SharingCase,
  TieBreak,
  TieBreakRow,
  TornadoBar,
  WithUncertainty,
} from './strings/answer.ts';
export type { BandRequest } from './strings/band/band.ts';
export { bandOf } from './strings/band/band.ts';
export type { Bank, Branch } from './strings/banks.ts';
export { bankOf, banksOf } from './strings/banks.ts';
export { usualCycle } from './strings/drift/cycle.ts';
export { driftOf } from './strings/drift/drift.ts';
export type { JoiningRequest } from './strings/joining/joining.ts';
export { joiningOf } from './strings/joining/joining.ts';
export type { JoinPair } from './strings/joining/joinPairs.ts';
export { joinPairs } from './strings/joining/joinPairs.ts';
export type { JoinBlock, JoinSideAsk } from './strings/joining/joinSide.ts';
export { type LayoutsRequest, layoutsOf } from './strings/layouts/layouts.ts';
export { type LeadsRequest, leadToleranceOf } from './strings/layouts/leads.ts';
export type { FromReadingsRequest } from './strings/readings/fromReadings.ts';
export { fromReadings } from './strings/readings/fromReadings.ts';
export type { SeriesRequest } from './strings/readings/series.ts';
export { seriesOf } from './strings/readings/series.ts';
export { atRestOf } from './strings/sharing/circulating.ts';
export { heaviestCase, oneOutOf } from './strings/sharing/oneOut.ts';
export type { SharingRequest } from './strings/sharing/sharing.ts';
export { sharingOf } from './strings/sharing/sharing.ts';
export type { JoinAsk, RestingString, StringsStudy, StudyRequest } from './strings/study.ts';
export { isWorthStudying, studyStrings } from './strings/study.ts';
export type { SentenceTopic, StudySentence } from './strings/words/sentence.ts';
export { heaviest } from './strings/words/sentence.ts';
export { studySentences } from './strings/words/sentences.ts';
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
  WithstandRow,
  WithstandTables,
} from './tables/conductorTables.ts';
export type {
  BandRow,
  BreakerInterruptRow,
  DeviceTables,
  PulseShare,
  RatingSeries,
  SelectivityRatios,
  TypicalInterrupt,
} from './tables/deviceTables.ts';
export type {
  ColdVoltsFactor,
  Figure,
  PracticeTable,
  SmallestConductor,
  SolarPractice,
  UnfusedLength,
} from './tables/practiceTable.ts';
export type { Basis, Status } from './tables/status.ts';
export type { Tables } from './tables/tables.ts';
export type { ConductorSize } from './units/conductorSize.ts';
export { parseSize, sizeText } from './units/conductorSize.ts';
export { readCount } from './units/countFieldText.ts';
export type { Curve } from './units/curveFieldText.ts';
export { curveText, readCurve } from './units/curveFieldText.ts';
export type { EchoRequest } from './units/fieldEcho.ts';
export { echoOf } from './units/fieldEcho.ts';
export type { FieldChoice, FieldReading, Way } from './units/fieldReading.ts';
export { isBareNumber } from './units/fieldReading.ts';
export type { FieldRequest, ShownField } from './units/fieldText.ts';
export { readField, shownField } from './units/fieldText.ts';
export type { FieldUnit, UnitsFirst } from './units/fieldUnit.ts';
export { factor, fieldUnit, milliohm } from './units/fieldUnit.ts';
export type { FigureText } from './units/figureText.ts';
export { figureText, firstText, wholeFigureText } from './units/figureText.ts';
export { formatQuantity } from './units/formatQuantity.ts';
export { fahrenheitText, feetText } from './units/imperial.ts';
export type { LengthRequest } from './units/lengthFieldText.ts';
export { halvedText, readLength } from './units/lengthFieldText.ts';
export { fixedText, numberText } from './units/numberText.ts';
export type { Parsed } from './units/parsed.ts';
export { quoted } from './units/parsed.ts';
export { parseQuantity } from './units/parseQuantity.ts';
export type { Efficiency } from './units/pointsFieldText.ts';
export { pointsText, readPoints } from './units/pointsFieldText.ts';
export { readSizeField } from './units/sizeFieldText.ts';
export type { UnitName } from './units/unitName.ts';
export { describeUnit, unitKinds } from './units/unitName.ts';
