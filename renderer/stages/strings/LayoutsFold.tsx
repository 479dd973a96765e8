/** The ways to connect the person's own strings, drawn side by side, and how equal their leads have to be. */
import { styled } from '@mui/material/styles';
import type { ReactElement } from 'react';
import { firstText, formatQuantity, type Layout, type LayoutStudy, type LeadStudy } from '../../../core/api.ts';
import { LayoutThumb, type ThumbString } from '../../charts/LayoutThumb.tsx';
import { FigureTable, Sideways } from '../../controls/FigureTable.tsx';
import { Assumed, More, Quiet, Said } from '../../controls/Prose.tsx';
import { StudyPlace } from '../../controls/StudyPlace.tsx';
import { usePreferences } from '../../state/preferences.ts';
import type { Study } from '../../state/studies.ts';
import type { LayoutsAnswer } from '../../workers/stringsMessages.ts';
import { Fold } from './Fold.tsx';
import { KeyOf } from './KeyOf.tsx';
import type { Tags } from './tags.ts';
import { percent } from './words.ts';

/** Drawings before the rest is told in a table: every pair of taps of a long row would fill pages. */
const MOST_DRAWN = 8;

export function LayoutsFold({
  study,
  tags,
}: {
  readonly study: Study<LayoutsAnswer>;
  readonly tags: Tags;
}): ReactElement {
  return (
    <Fold
      name="layouts"
      title="Layouts and leads"
      answer={
        study.answer === null
          ? 'same end, opposite ends, equal leads, tree, and every pair of taps'
          : inShort(study.answer)
      }
    >
      <StudyPlace study={study} doing="Solving every way to connect the bank" begin="Solve every way to connect it">
        {({ layouts, leads }) => (
          <>
            {layouts === null ? (
              <Quiet>No bank has two strings side by side that carry something in this case.</Quiet>
            ) : (
              <Layouts study={layouts} tags={tags} />
            )}
            <Leads study={leads} tags={tags} />
          </>
        )}
      </StudyPlace>
    </Fold>
  );
}

function inShort({ layouts }: LayoutsAnswer): string {
  if (layouts === null) return 'nothing to connect in another way';
  const drawn = layouts.layouts.find(({ kind }) => kind === 'as-drawn');
  const best = layouts.layouts.find(({ name }) => name === layouts.best);
  if (drawn === undefined || best === undefined) return '';
  if (best === drawn) return `as drawn is the best: ${percent(drawn.spread)} off`;
  return `best: ${best.name}, ${percent(best.spread)} off; as drawn ${percent(drawn.spread)}`;
}

function Layouts({ study, tags }: { readonly study: LayoutStudy; readonly tags: Tags }): ReactElement {
  const strings = study.strings.map((id): ThumbString => {
    const known = tags.get(id);
    return { id, tag: known?.tag ?? id, hatch: known?.hatch ?? 0 };
  });
  const drawn = shown(study);
  const rest = study.layouts.filter((layout) => !drawn.includes(layout));
  const most = Math.max(0, ...drawn.map(({ spread }) => spread));
  return (
    <>
      <Grid>
        {drawn.map((layout) => (
          <li key={layout.name} data-best={layout.name === study.best ? '' : undefined}>
            <LayoutHead layout={layout} isBest={layout.name === study.best} />
            <LayoutThumb layout={layout} strings={strings} most={most} />
          </li>
        ))}
      </Grid>
      <Quiet>
        Bars: how far each string is off its fair share, the copper line, at{' '}
        {formatQuantity({ value: Math.abs(study.bankA), unit: 'A', digits: 3 })} of the bank. Filled discs: where the
        loads are taken off; open arrows: where chargers come in, if elsewhere. “Best” is the most even way in which the
        blocks stay where they lie.
      </Quiet>
      {rest.length > 0 && <RestOfLayouts layouts={rest} />}
      <Assumed texts={study.assumed} />
    </>
  );
}

/** As drawn and the best always; of the others the most even. */
function shown({ layouts, best }: LayoutStudy): readonly Layout[] {
  const first = layouts.filter(({ kind, name }) => kind === 'as-drawn' || name === best);
  const others = layouts.filter((layout) => !first.includes(layout));
  const kept = new Set([...first, ...named(others), ...others].slice(0, MOST_DRAWN));
  return layouts.filter((layout) => kept.has(layout));
}

/** The ways that have a name of their own before those that are told by their taps. */
function named(layouts: readonly Layout[]): readonly Layout[] {
  return layouts.filter(({ kind }) => kind !== 'taps');
}

function LayoutHead({ layout, isBest }: { readonly layout: Layout; readonly isBest: boolean }): ReactElement {
  const { name, spread, lostW, cableM } = layout;
  return (
    <div style={{ minHeight: '3.5rem', fontSize: '0.8125rem', lineHeight: 1.35 }}>
      <div style={{ fontSize: '0.875rem', fontWeight: 600 }}>
        {name.charAt(0).toUpperCase() + name.slice(1)}
        {isBest && ' · best'}
      </div>
      <div style={{ color: 'var(--soft)' }}>
        <strong style={{ color: 'var(--ink)' }}>{percent(spread)} off</strong> ·{' '}
        {formatQuantity({ value: lostW, unit: 'W', digits: 2 })} lost
        <CableWords cableM={cableM} />
      </div>
    </div>
  );
}

function CableWords({ cableM }: { readonly cableM: number | null }): ReactElement | null {
  const first = usePreferences((preferences) => preferences.units);
  return cableM === null ? null : <> · {firstText({ value: cableM, unit: 'm', digits: 3, first })} of cable</>;
}

function RestOfLayouts({ layouts }: { readonly layouts: readonly Layout[] }): ReactElement {
  const first = usePreferences((preferences) => preferences.units);
  return (
    <More>
      <summary>{layouts.length} more ways to tap it</summary>
      <FigureTable>
        <thead>
          <tr>
            <th scope="col" data-text>
              Way
            </th>
            <th scope="col">Off</th>
            <th scope="col">Lost</th>
            <th scope="col">Cable</th>
          </tr>
        </thead>
        <tbody>
          {layouts.map(({ name, spread, lostW, cableM }) => (
            <tr key={name}>
              <th scope="row" data-text>
                {name}
              </th>
              <td>{percent(spread)}</td>
              <td>{formatQuantity({ value: lostW, unit: 'W', digits: 2 })}</td>
              <td>{cableM === null ? 'not known' : firstText({ value: cableM, unit: 'm', digits: 3, first })}</td>
            </tr>
          ))}
        </tbody>
      </FigureTable>
    </More>
  );
}

function Leads({ study, tags }: { readonly study: LeadStudy; readonly tags: Tags }): ReactElement | null {
  const first = usePreferences((preferences) => preferences.units);
  if (study.leads.length === 0) return null;
  const length = (value: number | null, absent: string): string =>
    value === null ? absent : firstText({ value, unit: 'm', digits: 3, first });
  return (
    <>
      <Said style={{ marginTop: '0.5rem' }}>
        How equal is equal enough: for no string more than {percent(study.limit)} off, the leads of one string may lie
        between these lengths, the others as drawn.
      </Said>
      <Sideways label="Lengths of leads">
        <FigureTable>
          <thead>
            <tr>
              <th scope="col" data-text>
                String
              </th>
              <th scope="col">As drawn</th>
              <th scope="col">Shortest</th>
              <th scope="col">Longest</th>
            </tr>
          </thead>
          <tbody>
            {study.leads.map(({ string, lengthM, shortestM, longestM }) => (
              <tr key={string}>
                <th scope="row" data-text>
                  <KeyOf tags={tags} id={string} />
                </th>
                <td>{length(lengthM, '–')}</td>
                <td>{length(shortestM, longestM === null ? 'no length will do' : 'any')}</td>
                <td>{length(longestM, shortestM === null ? '–' : 'any')}</td>
              </tr>
            ))}
          </tbody>
        </FigureTable>
      </Sideways>
    </>
  );
}

const Grid = styled('ul')({
  display: 'grid',
  gridTemplateColumns: 'repeat(auto-fill, minmax(13rem, 1fr))',
  gap: '0.75rem 1rem',
  listStyle: 'none',
  margin: 0,
  padding: 0,
  '& li': { borderTop: '3px solid var(--hair)', paddingTop: '0.25rem', maxWidth: '17rem' },
  '& li[data-best]': { borderTopColor: 'var(--copper)' },
});
