/** What `strings --json` prints: the keys that the contract states, and beside them what else the study found. */
import { type BandStudy, type Bank, type OneOutStudy, type StringsStudy, studySentences } from '../../core/api.ts';
import { plainObject } from './jsonText.ts';

export function stringsAnswer(study: StringsStudy): unknown {
  const { cases, atRest, atRestFirst, joining, joiningMissing, layouts, leads, oneOut, band, series, drift } = study;
  return {
    says: studySentences(study),
    banks: study.banks.map(bankAnswer),
    shareLimit: study.shareLimit,
    resting: study.resting,
    cases,
    atRest: { ...atRest, firstMoment: { strings: atRestFirst.strings, givenA: atRestFirst.givenA } },
    joining,
    joiningMissing,
    judgedCase: study.judgedCase,
    layouts: layouts?.layouts ?? [],
    layoutStudy: layouts === null ? null : withoutList(layouts),
    leads,
    oneOut: oneOut.flatMap(lossesAnswer),
    oneOutStudy: oneOut.map(({ losses: _losses, ...summary }) => summary),
    band: bandAnswer(band),
    bandStudy: band === null ? null : bandSummary(band),
    series,
    fromReadings: study.fromReadings,
    ...(drift === null ? {} : { drift }),
  };
}

function bankAnswer({ branches, capacityAh }: Bank): unknown {
  return { branches: branches.map(({ strings }) => strings.map(({ id }) => id)), capacityAh };
}

function withoutList({ layouts: _layouts, ...rest }: NonNullable<StringsStudy['layouts']>): unknown {
  return rest;
}

function lossesAnswer({ case: id, bank, losses }: OneOutStudy): readonly unknown[] {
  return losses.map((loss) => ({ ...loss, case: id, bank }));
}

function bandAnswer(band: BandStudy | null): unknown {
  const strings = (band?.strings ?? []).map(({ id, currentA, deviation, nominalA }) => {
    const { p05, p50, p95 } = currentA;
    return [id, { p05A: p05, p50A: p50, p95A: p95, nominalA, deviation }] as const;
  });
  return plainObject(new Map(strings));
}

function bandSummary({ strings: _strings, ...rest }: BandStudy): unknown {
  return rest;
}
