/** What the readings say of the strings: EMF and resistance of each, fuller or sick, and how even the blocks of a string are. */
import type { ReactElement } from 'react';
import {
  type FromReadings,
  fixedText,
  formatQuantity,
  plainFields,
  type SeriesImbalance,
  type TieBreak,
  type TieBreakRow,
  type WithUncertainty,
} from '../../../core/api.ts';
import { FigureTable, Sideways } from '../../controls/FigureTable.tsx';
import { More, Quiet, Said } from '../../controls/Prose.tsx';
import { SeverityMark } from '../../controls/SeverityMark.tsx';
import { Fold } from './Fold.tsx';
import { KeyOf } from './KeyOf.tsx';
import { type Tags, tagList, tagOf } from './tags.ts';

export interface ReadingsFoldProps {
  readonly read: FromReadings;
  readonly series: readonly SeriesImbalance[];
  /** Of the cases that were solved, this one is told first. */
  readonly caseId: string;
  readonly tags: Tags;
}

export function ReadingsFold({ read, series, caseId, tags }: ReadingsFoldProps): ReactElement | null {
  const { strings, tieBreaks, restSumA, restText, missing } = read;
  if (strings.length + tieBreaks.length + missing.length + series.length === 0 && restSumA === null) return null;
  const here = series.filter((one) => one.from === 'readings' || one.case === caseId);
  const elsewhere = series.filter((one) => !here.includes(one));
  return (
    <Fold name="readings" title="From readings, and along each string" answer={inShort(read, series, tags)}>
      {strings.length > 0 && <StringsRead read={read} tags={tags} />}
      {restText !== undefined && <Said>{plainFields(restText)}</Said>}
      {tieBreaks.map((one) => (
        <TieBreakTable key={one.string} tieBreak={one} tags={tags} />
      ))}
      {missing.map((text) => (
        <Quiet key={text}>{plainFields(text)}</Quiet>
      ))}
      {here.map((one) => (
        <SeriesTable key={seriesName(one)} imbalance={one} tags={tags} />
      ))}
      {elsewhere.length > 0 && (
        <More>
          <summary>Along the strings in other cases</summary>
          {elsewhere.map((one) => (
            <SeriesTable key={seriesName(one)} imbalance={one} tags={tags} />
          ))}
        </More>
      )}
    </Fold>
  );
}

function seriesName({ strings, case: caseId, from, set }: SeriesImbalance): string {
  return [...strings, from === 'readings' ? 'as read' : 'as solved', caseId ?? '', set ?? ''].join(' ').trim();
}

function inShort(
  { strings, tieBreaks, missing }: FromReadings,
  series: readonly SeriesImbalance[],
  tags: Tags,
): string {
  const [tie] = tieBreaks;
  if (tie !== undefined) return `string ${tagOf(tags, tie.string)}: fuller, or sick?`;
  if (strings.length > 0)
    return `${tagList(tags, [...new Set(strings.map(({ string }) => string))])} told by their readings`;
  const [first] = series;
  if (first?.midpoint !== undefined && first.midpoint !== null) {
    const apart = formatQuantity({ value: first.midpoint.differenceV * 1000, unit: 'mV', digits: 3 });
    return `halves of ${tagList(tags, first.strings)} ${apart} apart`;
  }
  return missing.length > 0 ? 'the readings do not tell yet' : 'volts along each string';
}

function plusMinus({ value, standard }: WithUncertainty, unit: string): string {
  const milli = unit === 'ohm' && Math.abs(value) < 1;
  const by = milli ? 1000 : 1;
  const sign = milli ? 'mΩ' : unit === 'ohm' ? 'Ω' : unit;
  const decimals = Math.max(0, Math.min(3, 1 - Math.floor(Math.log10(Math.max(standard * by, 1e-4)))));
  const text = (one: number): string => fixedText({ value: one * by, decimals, keepZeros: true }).replace('-', '−');
  return `${text(value)} ± ${text(standard)}\u00a0${sign}`;
}

function StringsRead({ read, tags }: { readonly read: FromReadings; readonly tags: Tags }): ReactElement {
  return (
    <Sideways label="Strings as their readings tell them">
      <FigureTable>
        <thead>
          <tr>
            <th scope="col" data-text>
              String
            </th>
            <th scope="col">Rest volts</th>
            <th scope="col">Expected</th>
            <th scope="col">Resistance</th>
            <th scope="col">Expected</th>
            <th scope="col" data-text>
              What it says
            </th>
          </tr>
        </thead>
        <tbody>
          {read.strings.map(({ string, cases, set, emfV, resistanceOhm, expectedOhm, expectedEmfV, text }) => (
            <tr key={`${string} ${cases.join(' ')} ${set ?? ''}`}>
              <th scope="row" data-text>
                <KeyOf tags={tags} id={string} />
              </th>
              <td>{plusMinus(emfV, 'V')}</td>
              <td>{formatQuantity({ value: expectedEmfV, unit: 'V', digits: 4 })}</td>
              <td>{plusMinus(resistanceOhm, 'ohm')}</td>
              <td>{formatQuantity({ value: expectedOhm, unit: 'ohm', digits: 3 })}</td>
              <td data-text style={{ minWidth: '14rem', whiteSpace: 'normal' }}>
                {plainFields(text)}
              </td>
            </tr>
          ))}
        </tbody>
      </FigureTable>
    </Sideways>
  );
}

const CAUSES: Readonly<Record<TieBreakRow['cause'], string>> = {
  fuller: 'It is fuller than the others',
  'high-resistance': 'Its resistance has risen',
  'bad-joint': 'A joint of it is bad',
  'shorted-cell': 'A cell of it is shorted',
};

function TieBreakTable({ tieBreak, tags }: { readonly tieBreak: TieBreak; readonly tags: Tags }): ReactElement {
  return (
    <>
      <Said style={{ marginTop: '0.5rem' }}>
        <strong>String {tagOf(tags, tieBreak.string)} takes less: fuller, or sick?</strong> {plainFields(tieBreak.next)}
      </Said>
      <Sideways label={`Causes for string ${tagOf(tags, tieBreak.string)}`}>
        <FigureTable>
          <thead>
            <tr>
              {['Cause', 'At rest', 'On load', 'On charge', 'Across a joint', 'The readings'].map((head) => (
                <th scope="col" key={head} data-text>
                  {head}
                </th>
              ))}
            </tr>
          </thead>
          <tbody>
            {tieBreak.rows.map(({ cause, atRest, onLoad, onCharge, acrossJoint, agrees }) => (
              <tr key={cause}>
                <th scope="row" data-text>
                  {CAUSES[cause]}
                </th>
                {[atRest, onLoad, onCharge, acrossJoint].map((text, column) => (
                  // biome-ignore lint/suspicious/noArrayIndexKey: a column is known by its place
                  <td key={column} data-text>
                    {text}
                  </td>
                ))}
                <td data-text style={{ whiteSpace: 'nowrap' }}>
                  {agrees === 'yes' ? (
                    <>
                      <SeverityMark severity="look" bare /> agree
                    </>
                  ) : agrees === 'no' ? (
                    'speak against it'
                  ) : (
                    'cannot tell'
                  )}
                </td>
              </tr>
            ))}
          </tbody>
        </FigureTable>
      </Sideways>
    </>
  );
}

function SeriesTable({ imbalance, tags }: { readonly imbalance: SeriesImbalance; readonly tags: Tags }): ReactElement {
  const { strings, blocks, remarks, totalV, from, case: caseId } = imbalance;
  const volts = (value: number, digits = 4): string => formatQuantity({ value, unit: 'V', digits });
  const milli = (value: number): string => `${String(Math.round(value * 1000)).replace('-', '−')}\u00a0mV`;
  const signed = (value: number): string => formatQuantity({ value, unit: '1', digits: 3 }).replace('-', '−');
  return (
    <>
      <Said style={{ marginTop: '0.5rem' }}>
        <strong>Along {tagList(tags, strings)}</strong>: {volts(totalV)} in all,{' '}
        {from === 'readings' ? 'as read' : 'as solved'}
        {caseId === null ? '' : ` in ${caseId}`}.
      </Said>
      {blocks.length > 0 && (
        <Sideways label={`Volts along ${seriesName(imbalance)}`}>
          <FigureTable>
            <thead>
              <tr>
                <th scope="col" data-text>
                  From minus to plus
                </th>
                <th scope="col">Volts</th>
                <th scope="col">From the mean</th>
                <th scope="col">Of the mean</th>
              </tr>
            </thead>
            <tbody>
              {blocks.map(({ name, voltageV, fromMeanV, fromMean }) => (
                <tr key={name}>
                  <th scope="row" data-text>
                    {name}
                  </th>
                  <td>{volts(voltageV)}</td>
                  <td>{milli(fromMeanV)}</td>
                  <td>{signed(fromMean)}</td>
                </tr>
              ))}
            </tbody>
          </FigureTable>
        </Sideways>
      )}
      {remarks.map((text) => (
        <Quiet key={text}>{plainFields(text)}</Quiet>
      ))}
    </>
  );
}
