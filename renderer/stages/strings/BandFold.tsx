/** How sure the shares are over what was assumed: the band of the draws, the figures that matter most, and the reading that would settle it. */
import type { ReactElement } from 'react';
import { type BandStudy, formatQuantity, plainFields, type TornadoBar } from '../../../core/api.ts';
import { TornadoBars } from '../../charts/TornadoBars.tsx';
import { Figure } from '../../controls/Figure.tsx';
import { FigureTable, Sideways } from '../../controls/FigureTable.tsx';
import { Quiet, Said } from '../../controls/Prose.tsx';
import { StudyPlace } from '../../controls/StudyPlace.tsx';
import { ORIGIN_MEANING } from '../../controls/words.ts';
import type { Study } from '../../state/studies.ts';
import { Fold } from './Fold.tsx';
import { KeyOf } from './KeyOf.tsx';
import { type Tags, tagOf } from './tags.ts';
import { amps, percent } from './words.ts';

/** Figures that are shown; what comes after moves the answer little. */
const MOST_FIGURES = 6;

export function BandFold({
  study,
  tags,
}: {
  readonly study: Study<BandStudy | null>;
  readonly tags: Tags;
}): ReactElement {
  return (
    <Fold
      name="band"
      title="How sure"
      answer={study.answer === null ? 'over the ranges of what was assumed' : inShort(study.answer)}
    >
      <StudyPlace
        study={study}
        doing="Drawing the assumed figures from their ranges"
        begin="Draw the assumed figures from their ranges"
      >
        {(band) =>
          band === null ? (
            <Quiet>This case has no operating point to draw about.</Quiet>
          ) : (
            <Band band={band} tags={tags} />
          )
        }
      </StudyPlace>
    </Fold>
  );
}

function inShort({ verdict }: BandStudy): string {
  const { holds, nominalWithin, within, limit } = verdict;
  const says = nominalWithin
    ? `every string within ${percent(limit)} in ${percent(within)} of the draws`
    : `a string more than ${percent(limit)} off in ${percent(1 - within)} of the draws`;
  return `${holds ? 'the verdict holds' : 'the verdict hangs on assumed figures'}: ${says}`;
}

function Band({ band, tags }: { readonly band: BandStudy; readonly tags: Tags }): ReactElement {
  const { judged, tornado, strings, reading, verdict } = band;
  const nominalA = strings.find(({ id }) => id === judged)?.nominalA ?? 0;
  return (
    <>
      <Said>{plainFields(verdict.text)}</Said>
      {reading !== null && (
        <Said>
          <strong>What would settle it.</strong> {plainFields(reading.text)}
        </Said>
      )}
      <Sideways label="Band of each string">
        <FigureTable>
          <caption>
            {band.draws} draws, seed {band.seed}; nine of ten lie between the outer columns
          </caption>
          <thead>
            <tr>
              <th scope="col" data-text>
                String
              </th>
              <th scope="col">5 in 100 below</th>
              <th scope="col">Middle</th>
              <th scope="col">5 in 100 above</th>
              <th scope="col">At the figures as they are</th>
            </tr>
          </thead>
          <tbody>
            {strings.map(({ id, currentA, nominalA: own }) => (
              <tr key={id}>
                <th scope="row" data-text>
                  <KeyOf tags={tags} id={id} />
                </th>
                {[currentA.p05, currentA.p50, currentA.p95, own].map((value, column) => (
                  // biome-ignore lint/suspicious/noArrayIndexKey: a column is known by its place
                  <td key={column}>
                    <Figure value={value} unit="A" digits={3} prefix={false} />
                  </td>
                ))}
              </tr>
            ))}
          </tbody>
        </FigureTable>
      </Sideways>
      {tornado.length > 0 && (
        <div style={{ marginTop: '0.5rem' }}>
          <TornadoBars
            caption={`What moves string ${tagOf(tags, judged)} most, from ${amps(nominalA, 3)}`}
            nominalA={nominalA}
            rows={tornado.slice(0, MOST_FIGURES).map((bar) => rowOf(bar))}
          />
        </div>
      )}
      {band.allGiven && <Quiet>No figure of a string is assumed: all were measured or read from a label.</Quiet>}
    </>
  );
}

const UNITS: Readonly<Record<TornadoBar['quantity'], string>> = {
  emfV: 'V',
  resistanceOhm: 'ohm',
  currentA: 'A',
  powerW: 'W',
};

function rowOf({ part, label, quantity, origin, low, high, lowA, highA }: TornadoBar) {
  const text = (value: number): string => formatQuantity({ value, unit: UNITS[quantity], digits: 4 });
  return {
    key: `${part} ${label}`,
    name: plainFields(label),
    lowText: text(low),
    highText: text(high),
    origin: ORIGIN_MEANING[origin].word,
    lowA,
    highA,
  };
}
