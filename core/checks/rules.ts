/** Every rule, by family. A table of rules, their bases and their tests is made from this list. */

import { backfeedIntoBadString } from './backfeedRule.ts';
import { bigBankNeedsMore, interruptUnknown } from './bankInterruptRules.ts';
import { batteryByFuel, batteryLoose, noLowCutoff } from './batteryPlaceRules.ts';
import { gasNoVent, sparkNearGas } from './batterySpaceRules.ts';
import { bondTooSmall } from './bondRules.ts';
import { isolatorOutOfReach, twoSourceBox } from './boxRules.ts';
import { breakerUnderTable } from './breakerTableRule.ts';
import { tightBundle } from './bundleRules.ts';
import { busbarFault } from './busbarFaultRule.ts';
import { cableOverloaded, cableUnderContinuous } from './cableRules.ts';
import { chargerVoltsOff, coldCharge } from './chargingRules.ts';
import { cableCooks, faultTooWeak } from './clearingRules.ts';
import { acPartOnDc, fuseOverDeviceLimit } from './deviceLimitRules.ts';
import { chargeDropTooBig, dropTooBig } from './dropRules.ts';
import { fuseUnderContinuous, fuseUnderCurrent } from './fuseLoad.ts';
import { fuseOverCable, smallWireCap } from './fuseRules.ts';
import { fuseWarm, hotPlace } from './hotPlaceRules.ts';
import { interruptTooLow } from './interruptRule.ts';
import { inverterCable } from './inverterRules.ts';
import { autoReset, sourceWithoutIsolator, switchNotBreaking } from './isolatorRules.ts';
import { joiningSurge } from './joiningRule.ts';
import { linkOverloaded, tapsApart } from './linkRules.ts';
import { loadOverfed, loadStarved } from './loadVolts.ts';
import { midpointOff } from './midpointRule.ts';
import { parallelMix, tooManyStrings } from './mixRules.ts';
import { oneOutOverload } from './oneOutRule.ts';
import { parallelLegsUnequal, parallelLegsUnfused } from './parallelLegRules.ts';
import { faultNotParted } from './partedRule.ts';
import { ratingUnderCurrent, shuntSmall, voltsRatingLow } from './partRatings.ts';
import { polarityCrossed } from './polarityRule.ts';
import { bothPolesOpenSystem, fuseInEarthedPole } from './poleRules.ts';
import { circulatingAtRest } from './restRules.ts';
import { returnSmaller } from './returnRules.ts';
import { ringFeed } from './ringRules.ts';
import type { Rule } from './rule.ts';
import { tripsTogether } from './selectivityRule.ts';
import { seriesMismatch } from './seriesRule.ts';
import { shareUneven } from './sharingRule.ts';
import { deadShort, noFuseOnSource } from './shortRules.ts';
import { cableShrinks } from './shrinkRule.ts';
import { cableTooThin, wrongMetalOrSolid } from './smallestRules.ts';
import { controllerAmps, pvCable } from './solarCurrentRules.ts';
import { pvStringFuse, pvWrongWay } from './solarFuseRules.ts';
import { pvVoltsCold, pvVoltsHot } from './solarVoltsRules.ts';
import { chargerEndOpen, generatorFuseSize } from './sourceEndRules.ts';
import { starterCableShared } from './starterRules.ts';
import { stringUnfused } from './stringFuseRules.ts';
import { chargeTooStrong, stringChargeHigh, stringDischargeHigh } from './stringRules.ts';
import { bareLiveStud, springClips, studCrowded } from './studRules.ts';
import { nuisanceBlow } from './surgeMeltRules.ts';
import { surgeSag } from './surgeRules.ts';
import { busbarSmall, mainSwitchSmall } from './switchBarRules.ts';
import { terminalTooCool } from './terminalRules.ts';
import { fuseTooFar } from './unfusedRules.ts';
import { dropAddedUp, mixedVolts } from './voltsMixRules.ts';
import { endOpen, groupUnconnected, loadCollapse, loadUnfed, partNeverUsed } from './wiringRules.ts';

export const rules: readonly Rule[] = [
  deadShort,
  polarityCrossed,
  loadCollapse,
  loadUnfed,
  groupUnconnected,
  partNeverUsed,
  endOpen,
  noFuseOnSource,
  faultNotParted,
  fuseTooFar,
  chargerEndOpen,
  generatorFuseSize,
  stringUnfused,
  backfeedIntoBadString,
  bothPolesOpenSystem,
  fuseInEarthedPole,
  starterCableShared,
  cableShrinks,
  sourceWithoutIsolator,
  switchNotBreaking,
  autoReset,
  parallelLegsUnequal,
  parallelLegsUnfused,
  returnSmaller,
  fuseOverCable,
  smallWireCap,
  fuseUnderCurrent,
  fuseUnderContinuous,
  cableOverloaded,
  cableUnderContinuous,
  voltsRatingLow,
  ratingUnderCurrent,
  shuntSmall,
  dropTooBig,
  chargeDropTooBig,
  loadStarved,
  loadOverfed,
  surgeSag,
  stringDischargeHigh,
  stringChargeHigh,
  chargeTooStrong,
  shareUneven,
  circulatingAtRest,
  joiningSurge,
  oneOutOverload,
  tooManyStrings,
  parallelMix,
  seriesMismatch,
  midpointOff,
  linkOverloaded,
  tapsApart,
  chargerVoltsOff,
  coldCharge,
  hotPlace,
  tightBundle,
  fuseWarm,
  nuisanceBlow,
  fuseOverDeviceLimit,
  cableTooThin,
  wrongMetalOrSolid,
  bondTooSmall,
  interruptUnknown,
  interruptTooLow,
  bigBankNeedsMore,
  breakerUnderTable,
  faultTooWeak,
  cableCooks,
  tripsTogether,
  busbarFault,
  acPartOnDc,
  pvVoltsCold,
  pvVoltsHot,
  controllerAmps,
  pvCable,
  pvStringFuse,
  pvWrongWay,
  inverterCable,
  terminalTooCool,
  mainSwitchSmall,
  busbarSmall,
  studCrowded,
  springClips,
  bareLiveStud,
  dropAddedUp,
  gasNoVent,
  sparkNearGas,
  batteryLoose,
  batteryByFuel,
  noLowCutoff,
  mixedVolts,
  ringFeed,
  twoSourceBox,
  isolatorOutOfReach,
];
