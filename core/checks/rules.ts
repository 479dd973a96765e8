/** Every rule, by family. A table of rules, their bases and their tests is made from this list. */
import { cableOverloaded, cableUnderContinuous } from './cableRules.ts';
import { chargerVoltsOff, coldCharge } from './chargingRules.ts';
import { chargeDropTooBig, dropTooBig } from './dropRules.ts';
import { fuseUnderContinuous, fuseUnderCurrent } from './fuseLoad.ts';
import { fuseOverCable, smallWireCap } from './fuseRules.ts';
import { joiningSurge } from './joiningRule.ts';
import { linkOverloaded, tapsApart } from './linkRules.ts';
import { loadOverfed, loadStarved } from './loadVolts.ts';
import { midpointOff } from './midpointRule.ts';
import { parallelMix, tooManyStrings } from './mixRules.ts';
import { oneOutOverload } from './oneOutRule.ts';
import { ratingUnderCurrent, shuntSmall, voltsRatingLow } from './partRatings.ts';
import { polarityCrossed } from './polarityRule.ts';
import { circulatingAtRest } from './restRules.ts';
import type { Rule } from './rule.ts';
import { seriesMismatch } from './seriesRule.ts';
import { shareUneven } from './sharingRule.ts';
import { deadShort, noFuseOnSource } from './shortRules.ts';
import { chargeTooStrong, stringChargeHigh, stringDischargeHigh } from './stringRules.ts';
import { surgeSag } from './surgeRules.ts';
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
];
