/** The bank as found beside the bank as it would be after one change: the same strings on the same scale. */
import Box from '@mui/material/Box';
import type { ReactElement } from 'react';
import type { BandStudy, Bank, BankMeasure, SharedString, SharingCase } from '../../../core/api.ts';
import { barScale, type ShareBar, ShareBars } from '../../charts/ShareBars.tsx';
import { Figure } from '../../controls/Figure.tsx';
import { Quiet } from '../../controls/Prose.tsx';
import { SeverityMark } from '../../controls/SeverityMark.tsx';
import type { TriedChange } from '../../workers/stringsMessages.ts';
import { MakeChange } from './MakeChange.tsx';
import type { Tags } from './tags.ts';
import { amps, changeEffect, isLone, NOTICED_A, sharedRemark, worstOf } from './words.ts';

export interface SharesProps {
  readonly sharing: SharingCase;
  readonly banks: readonly Bank[];
  readonly tags: Tags;
  readonly band: BandStudy | null;
  /** The change that is shown as proposed. */
  readonly proposed: TriedChange | null;
  /** Stands in the place of the proposed bank where there is none. */
  readonly instead: ReactElement;
}

export function Shares({ sharing, banks, tags, band, proposed, instead }: SharesProps): ReactElement {
  const found = foundBars({ sharing, banks, tags, band });
  const after = proposed === null ? [] : proposedBars(proposed.after, found);
  const scale = barScale([...found, ...after]);
  return (
    <Box sx={{ display: 'flex', flexWrap: 'wrap', gap: '0.75rem 2rem', alignItems: 'start' }}>
      <Box sx={{ flex: '3 1 30rem', minWidth: 0 }}>
        {banks.map((bank, index) => {
          const own = found.filter(({ bank: place }) => place === index);
          const isLarge = own.length > REMARKS_IN_ROWS;
          return (
            <Box
              component="section"
              key={bank.strings[0]?.id}
              aria-label={bankName(bank, banks.length)}
              sx={{ mb: '0.5rem' }}
            >
              <Head title={banks.length === 1 ? 'As found' : bankName(bank, banks.length)}>
                <BankCurrent currentA={sharing.banksA[index] ?? null} capacityAh={bank.capacityAh} />
              </Head>
              <ShareBars
                caption="What each string carries, as found"
                bars={isLarge ? own.map((bar) => ({ ...bar, remark: null })) : own}
                scale={scale}
                heads={['Rate', 'Limit']}
              />
              {isLarge && <Remarks bars={own} />}
            </Box>
          );
        })}
      </Box>
      <Box component="section" aria-label="Proposed" sx={{ flex: '2 1 20rem', minWidth: 0 }}>
        {proposed === null ? (
          instead
        ) : (
          <>
            <Head title="Proposed">
              <span>worst string off {changeEffect(proposed.before, proposed.after)}</span>
            </Head>
            <ShareBars
              caption={`What each string would carry: ${proposed.label}`}
              bars={after}
              scale={scale}
              heads={[]}
            />
            <Box sx={{ mt: '0.375rem' }}>
              <MakeChange change={proposed} />
            </Box>
          </>
        )}
      </Box>
    </Box>
  );
}

/** In a larger bank what is to be said of several strings is said once, under the table. */
const REMARKS_IN_ROWS = 4;

function Remarks({ bars }: { readonly bars: readonly FoundBar[] }): ReactElement {
  const tagsBy = new Map<string, string[]>();
  for (const { tag, told } of bars) {
    if (told !== '') tagsBy.set(told, [...(tagsBy.get(told) ?? []), tag]);
  }
  return (
    <>
      {[...tagsBy].map(([told, tags]) => (
        <Quiet key={told}>
          <strong>{tags.join(', ')}.</strong> {told}
        </Quiet>
      ))}
    </>
  );
}

function Head({ title, children }: { readonly title: string; readonly children: ReactElement }): ReactElement {
  return (
    <Box sx={{ display: 'flex', alignItems: 'baseline', gap: '0.75rem' }}>
      <Box component="h2" sx={{ m: 0, fontSize: '1rem', fontWeight: 600 }}>
        {title}
      </Box>
      <Box component="span" sx={{ color: 'var(--soft)', fontSize: '0.875rem' }}>
        {children}
      </Box>
    </Box>
  );
}

function bankName({ strings }: Bank, of: number): string {
  if (of > 1 && strings.length === 1) return `String ${strings[0]?.id ?? ''}, alone`;
  return of === 1 ? 'As found' : `Bank of ${strings.map(({ id }) => id).join(', ')}`;
}

function BankCurrent({
  currentA,
  capacityAh,
}: {
  readonly currentA: number | null;
  readonly capacityAh: number;
}): ReactElement {
  if (currentA === null) return <>no answer in this case</>;
  if (Math.abs(currentA) < NOTICED_A) return <>rests · {capacityAh} Ah</>;
  const does = currentA < 0 ? 'is charged with' : 'gives';
  return (
    <>
      {does} {amps(currentA, 3)} · {capacityAh} Ah
    </>
  );
}

interface FoundBar extends ShareBar {
  readonly bank: number;
  /** The remark as text; empty where there is none. */
  readonly told: string;
}

function foundBars({
  sharing,
  banks,
  tags,
  band,
}: Pick<SharesProps, 'sharing' | 'banks' | 'tags' | 'band'>): readonly FoundBar[] {
  const worst = worstOf(sharing, banks);
  return sharing.strings.map((one): FoundBar => {
    const tag = tags.get(one.id);
    const banded = band?.strings.find(({ id }) => id === one.id)?.currentA;
    const remark = sharedRemark(one, sharing.banksA[one.bank] ?? null);
    return {
      id: one.id,
      bank: one.bank,
      tag: tag?.tag ?? one.id,
      name: tag?.name ?? one.id,
      hatch: tag?.hatch ?? 0,
      currentA: one.currentA,
      fairA: isLone(banks[one.bank]) ? null : one.fairA,
      deviation: isLone(banks[one.bank]) ? null : one.deviation,
      band: banded === undefined ? null : { lowA: banded.p05, highA: banded.p95 },
      isWorst: one.id === worst?.id && sharing.strings.length > 1,
      more: [<Rate key="rate" cRate={one.cRate} />, <Limit key="limit" string={one} />],
      told: remark,
      remark: remark === '' ? null : remark,
    };
  });
}

/** Amps over amp-hours. */
function Rate({ cRate }: { readonly cRate: number | null }): ReactElement {
  if (cRate === null) return <>–</>;
  return (
    <span style={{ whiteSpace: 'nowrap' }} title="Current over capacity, per hour">
      <Figure value={cRate} unit="C" digits={2} prefix={false} />
    </span>
  );
}

function Limit({ string: { limit, currentA } }: { readonly string: SharedString }): ReactElement {
  if (limit === null) return <span style={{ color: 'var(--soft)' }}>none known</span>;
  const isOver = currentA !== null && Math.abs(currentA) > limit.limitA;
  return (
    <span title={limit.basis.text} style={{ whiteSpace: 'nowrap' }}>
      {isOver && (
        <>
          <SeverityMark severity="fix" bare /> over{' '}
        </>
      )}
      <Figure value={limit.limitA} unit="A" digits={3} />
    </span>
  );
}

function proposedBars({ strings, worst }: BankMeasure, found: readonly FoundBar[]): readonly ShareBar[] {
  return strings.map(({ id, currentA, fairA, deviation }): ShareBar => {
    const before = found.find((one) => one.id === id);
    return {
      id,
      tag: before?.tag ?? id,
      name: before?.name ?? `${id}, new`,
      hatch: before?.hatch ?? 0,
      currentA,
      fairA,
      deviation,
      band: null,
      isWorst: id === worst,
      more: [],
      remark: null,
    };
  });
}

/** Where there is but one string: what the stage will show, and what can be said of the one. */
export function LoneString({ isCalm }: { readonly isCalm: boolean }): ReactElement {
  return (
    <Quiet>
      {isCalm
        ? 'Nothing has to be changed for these strings to share.'
        : 'A string that works alone shares with none. With a second one beside it this stage shows how the two share, what flows between them at rest, whether they may be joined, and what happens when one drops out.'}
    </Quiet>
  );
}
