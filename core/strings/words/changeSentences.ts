/** What is to be said of losses, layouts, leads, joints to be made, blocks in series, ranges and weeks of use. */
import type { DriftedString, Joining, Layout, OneOutStudy } from '../answer.ts';
import type { StringsStudy } from '../study.ts';
import {
  ampHours,
  amps,
  listed,
  metres,
  millivolts,
  mostOf,
  percent,
  type StudySentence,
  said,
  timeText,
  volts,
  watts,
} from './sentence.ts';

/** `Fine until one cuts out, then the rest follow`, or the largest load that survives. */
export function lossSentences({ oneOut }: StringsStudy, nameOf: (caseId: string) => string): readonly StudySentence[] {
  return oneOut.flatMap((one) => {
    const { bankA, largestA, survivesA } = one;
    if (largestA === null || survivesA === null) return [];
    const bounds = `largest load with all strings in ${amps(largestA)}, largest that survives any one loss ${amps(survivesA)}`;
    if (bankA > largestA) {
      return [
        said(
          'one-out',
          `${nameOf(one.case)}: ${amps(bankA)} is more than the strings carry even with all in (${bounds}).`,
        ),
      ];
    }
    if (bankA <= survivesA) {
      return [
        said(
          'one-out',
          `${nameOf(one.case)}: ${amps(bankA)} survives the loss of any one string or device (${bounds}).`,
        ),
      ];
    }
    return [said('one-out', `${nameOf(one.case)}, ${amps(bankA)}: ${afterLoss(one)} (${bounds}).`)];
  });
}

function afterLoss({ losses }: OneOutStudy): string {
  const over = losses.flatMap(({ lost, strings, cascade }) =>
    strings.flatMap(({ id, currentA, limit, overLimit }) =>
      overLimit && currentA !== null && limit !== null
        ? [{ lost, id, currentA, limitA: limit.limitA, follows: cascade.length > 0 }]
        : [],
    ),
  );
  const worst = mostOf(over, ({ currentA, limitA }) => Math.abs(currentA) / limitA);
  if (worst === undefined) return 'fine with all strings in, not with one out';
  const then = worst.follows ? 'fine until one cuts out, then the rest follow: a cascade' : 'fine until one cuts out';
  return `${then}; with ${worst.lost} out, ${worst.id} carries ${amps(worst.currentA)} against a limit of ${amps(worst.limitA)}`;
}

/** A change that leaves more than this part of the unevenness is no remedy. */
const NOTICED = 0.9;

/** The best that leaves the blocks where they lie, and what equal leads do and cost. */
export function layoutSentences({ layouts, shareLimit }: StringsStudy): readonly StudySentence[] {
  if (layouts === null) return [];
  const drawn = layouts.layouts.find(({ kind }) => kind === 'as-drawn');
  const best = layouts.layouts.find(({ name }) => name === layouts.best);
  const equal = layouts.layouts.find(({ kind }) => kind === 'equal-leads');
  if (drawn === undefined) return [];
  const told: StudySentence[] = [];
  if (best !== undefined && best.spread < NOTICED * drawn.spread && drawn.spread > shareLimit) {
    told.push(
      said(
        'layouts',
        `Of the ways to tap the bank with its blocks where they lie, ${best.name} shares best: ${evener(drawn, best)}.`,
      ),
    );
  } else if (drawn.spread > shareLimit) {
    told.push(
      said(
        'layouts',
        'No other way to tap the same blocks shares noticeably better than as drawn: what is uneven lies in the strings.',
      ),
    );
  } else {
    told.push(
      said(
        'layouts',
        `As drawn, wiring and strings keep every string within ${percent(drawn.spread)} of its fair share.`,
      ),
    );
  }
  if (equal !== undefined && drawn.spread > shareLimit && equal.spread < NOTICED * drawn.spread) {
    const costs = drawn.bankV - equal.bankV;
    const price =
      costs > 0
        ? `costs ${millivolts(costs)} at the taps at ${amps(layouts.bankA)}`
        : `gains ${millivolts(-costs)} at ${amps(layouts.bankA)}`;
    const even = equal.spread < 0.005 ? 'equalises' : `evens out: ${evener(drawn, equal)}`;
    told.push(said('layouts', `Making all leads equal ${price} and ${even}.`));
  }
  return told;
}

function evener(before: Layout, after: Layout): string {
  return `the worst string is ${percent(after.spread)} off instead of ${percent(before.spread)}`;
}

/** How long the leads of a string have to be, where they are not. */
export function leadSentences({ leads }: StringsStudy): readonly StudySentence[] {
  if (leads === null) return [];
  return leads.leads.flatMap(({ string, lengthM, shortestM, longestM }) => {
    const tooShort = shortestM !== null && lengthM < shortestM;
    const tooLong = longestM !== null && lengthM > longestM;
    if (!tooShort && !tooLong) return [];
    const bound = tooShort ? `at least ${metres(shortestM)}` : `at most ${metres(longestM ?? 0)}`;
    return [
      said(
        'leads',
        `It takes leads of ${bound} each on ${string} (now ${metres(lengthM)}), the others as drawn, to keep every string within ${percent(leads.limit)} of its fair share.`,
      ),
    ];
  });
}

/** Those that were asked for, else those that are not to be joined as they stand. */
export function joinSentences({ joining, joinsAsked }: StringsStudy): readonly StudySentence[] {
  const told = joinsAsked ? joining : joining.filter(({ within }) => !within);
  if (told.length > 0) return told.map((one) => said('joining', joinText(one)));
  const largest = mostOf(joining, ({ inrushA }) => inrushA);
  if (largest === undefined) return [];
  const flat = largest.flat ? ` ${PLATEAU}` : '';
  const text =
    largest.inrushA < NOTHING_A
      ? 'By the figures of the job all strings rest at the same volts; read both before joining any that were apart.'
      : `By the figures of the job, any two that were apart would stay within their limits if joined: at most ${amps(largest.inrushA)} at the first moment. Read both volts before joining.`;
  return [said('joining', text + flat)];
}

const PLATEAU = 'Equal volts do not prove equal charge on this flat curve: charge both full before joining.';
/** Less than a clamp meter tells. */
const NOTHING_A = 0.05;

function joinText({
  a,
  b,
  giver,
  gapV,
  inrushA,
  limits,
  limitA,
  safeGapV,
  within,
  resistor,
  movedAh,
  settleS,
  flat,
}: Joining): string {
  const plateau = flat ? ` ${PLATEAU}` : '';
  if (inrushA < NOTHING_A)
    return `Joining ${a} and ${b} now: they rest at the same volts, so nothing to speak of flows.${plateau}`;
  const least = limits.find((limit) => limit.limitA === limitA);
  const bound = least === undefined ? amps(limitA) : `${amps(limitA)} (${least.what})`;
  const start = `Joining ${a} and ${b} now: ${volts(Math.abs(gapV))} apart, ${giver} gives ${amps(inrushA)} at the first moment, ${within ? 'within' : 'beyond'} the ${bound}`;
  const moved = `${ampHours(movedAh)} moves, most of it in ${timeText(settleS)}`;
  const instead =
    resistor === null
      ? ''
      : ` Bring them within ${volts(safeGapV)} first, or join them through ${resistor.ohm.toPrecision(2)} Ω that takes ${watts(resistor.w)}${resistor.untilS === null ? '' : `, for ${timeText(resistor.untilS)}`}.`;
  return `${start}; ${moved}.${instead}${plateau}`;
}

/** Of what was read, and of the one case that all else is about; the remarks name the base of every percentage. */
export function seriesSentences({ series, judgedCase }: StringsStudy): readonly StudySentence[] {
  const told = series
    .filter((one) => one.from === 'readings' || one.case === judgedCase)
    .flatMap(({ strings, case: id, remarks }) => {
      const where = `Along ${listed(strings)}${id === null ? '' : `, ${id}`}: `;
      return remarks.map((text, index) => (index === 0 ? where + text : text));
    });
  return [...new Set(told)].map((text) => said('series', text));
}

export function bandSentences({ band }: StringsStudy): readonly StudySentence[] {
  if (band === null) return [];
  const { verdict, reading, allGiven } = band;
  return [
    said('band', verdict.text),
    ...(allGiven
      ? []
      : [
          said(
            'band',
            'Some figures of the strings are assumed from their chemistry and size; the range over the draws carries that.',
          ),
        ]),
    ...(reading === null ? [] : [said('band', reading.text)]),
  ];
}

export function readingSentences({ fromReadings }: StringsStudy): readonly StudySentence[] {
  return [
    ...fromReadings.strings.map(({ text }) => said('readings', text)),
    ...(fromReadings.restText === undefined ? [] : [said('readings', fromReadings.restText)]),
    ...fromReadings.tieBreaks.map(({ string, next }) => said('readings', `${string}, fuller or sick? ${next}`)),
  ];
}

export function driftSentences({ drift }: StringsStudy): readonly StudySentence[] {
  if (drift === null) return [];
  const ends = drift.strings
    .filter((one) => one.half !== 'lower' || isApart(one, drift.strings))
    .map(
      (one) =>
        `${one.half !== null && isApart(one, drift.strings) ? driftName(one) : one.id} ${percent(one.endCharge)}`,
    );
  const text = `After ${String(drift.cycles)} cycles (${timeText(drift.hours * 3600)}) the strings stand at ${listed(ends)} of their charge.`;
  return [
    said('drift', text),
    ...drift.events.slice(0, MOST_EVENTS).map((event) => said('drift', upperFirst(event.text))),
  ];
}

const MOST_EVENTS = 3;
/** Halves of a string whose charges differ by less are told as one. */
const HALVES_APART = 0.005;

function isApart(one: DriftedString, all: readonly DriftedString[]): boolean {
  return all.some((other) => other.id === one.id && Math.abs(other.endCharge - one.endCharge) > HALVES_APART);
}

/** `A`, or `A, upper half`. */
function driftName({ id, half }: DriftedString): string {
  return half === null ? id : `${id}, ${half} half`;
}

function upperFirst(text: string): string {
  const first = text.charAt(0).toUpperCase() + text.slice(1);
  return first.endsWith('.') ? first : `${first}.`;
}
