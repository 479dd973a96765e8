/** The same job under two rule books: what each finds, side by side; only what differs is marked, what is alike is folded. */
import Box from '@mui/material/Box';
import { type ReactElement, type ReactNode, useMemo } from 'react';
import type { CheckReport, Finding, FindingPair, Practice } from '../../../core/api.ts';
import { comparePractices, formatQuantity, partNames, plainFields } from '../../../core/api.ts';
import { BasisText } from '../../controls/BasisText.tsx';
import { Chip, ChipRow } from '../../controls/Chips.tsx';
import { Folded } from '../../controls/Folded.tsx';
import { Quiet, Said } from '../../controls/Prose.tsx';
import { SeverityMark } from '../../controls/SeverityMark.tsx';
import { StudyPlace } from '../../controls/StudyPlace.tsx';
import { useOpenJob } from '../../state/openJob.ts';
import { practiceWords } from '../site/practiceWords.ts';
import { ruleTitle } from './findingList.ts';
import { changeView, useFindingsView } from './findingsView.ts';
import { useProtectionStudy } from './protectionStudies.ts';

export function PracticesPanel({ own }: { readonly own: CheckReport }): ReactElement {
  const practice = useOpenJob(({ job }) => (job.practiceAssumed === true ? null : job.practice));
  const { otherPractice } = useFindingsView();
  const other = otherPractice === practice ? null : otherPractice;
  const study = useProtectionStudy('practice', other === null ? null : { practice: other });
  if (practice === null) return <Quiet>Choose the rule book of this job first.</Quiet>;
  return (
    <>
      <Said>
        Judged by <strong>{nameOf(practice)}</strong>. Against which other book?
      </Said>
      <ChipRow aria-label="Second rule book">
        {practiceWords
          .filter((words) => words.practice !== practice)
          .map((words) => (
            <Chip key={words.practice} title={words.books}>
              <input
                type="radio"
                name="second-practice"
                checked={words.practice === other}
                onChange={() => changeView({ otherPractice: words.practice })}
              />
              <span>{words.name}</span>
            </Chip>
          ))}
      </ChipRow>
      {other !== null && (
        <StudyPlace study={study} doing="Judging the job by the other book" begin="Judge by the other book">
          {(report) => <Columns own={own} other={report} names={[nameOf(practice), nameOf(other)]} />}
        </StudyPlace>
      )}
    </>
  );
}

function nameOf(practice: Practice): string {
  return practiceWords.find((words) => words.practice === practice)?.name ?? practice;
}

interface ColumnsProps {
  readonly own: CheckReport;
  readonly other: CheckReport;
  readonly names: readonly [own: string, other: string];
}

function Columns({ own, other, names }: ColumnsProps): ReactElement {
  const { apart, alike } = useMemo(() => comparePractices(own, other), [own, other]);
  return (
    <Box sx={{ containerType: 'inline-size', mt: '0.5rem' }}>
      <Box component="h2" aria-live="polite" sx={{ m: 0, mb: '0.375rem', fontSize: '1.1875rem', fontWeight: 600 }}>
        {apart.length === 0
          ? 'The two books find the same'
          : `${apart.length === 1 ? 'One finding differs' : `${String(apart.length)} findings differ`} between the two books`}
      </Box>
      {apart.length > 0 && <Pairs pairs={apart} names={names} label="Findings that differ" />}
      <Folded title="The same under both" aside={alike.length}>
        {alike.length === 0 ? (
          <Quiet>Nothing is the same.</Quiet>
        ) : (
          <Pairs pairs={alike} names={names} label="Findings that are the same" />
        )}
      </Folded>
      <Quiet>
        Not done for want of a figure: {own.notChecked.length} by the first, {other.notChecked.length} by the second.
        The edition adopted where the system stands governs.
      </Quiet>
    </Box>
  );
}

interface PairsProps {
  readonly pairs: readonly FindingPair[];
  readonly names: ColumnsProps['names'];
  readonly label: string;
}

/** By the panel's own width in letters, so that large text counts as narrow too. */
const NARROW = '@container (max-width: 40rem)';

function Pairs({ pairs, names, label }: PairsProps): ReactElement {
  const job = useOpenJob((open) => open.job);
  return (
    <Box
      component="ol"
      aria-label={label}
      sx={{ m: 0, p: 0, listStyle: 'none', borderBottom: '1px solid var(--hair)' }}
    >
      {pairs.map((pair) => {
        const any = pair.own ?? pair.other;
        if (any === null) return null;
        const where = partNames(job, any.parts);
        return (
          <Box component="li" key={pair.key} sx={{ borderTop: '1px solid var(--hair)', padding: '0.375rem 0.25rem' }}>
            <Box sx={{ fontSize: '0.9375rem' }}>
              <strong>{where === '' ? 'System' : where}</strong> · {ruleTitle(any.rule)}
            </Box>
            <Box sx={TWO}>
              <Side name={names[0]} finding={pair.own} against={pair.other} />
              <Side name={names[1]} finding={pair.other} against={pair.own} />
            </Box>
          </Box>
        );
      })}
    </Box>
  );
}

const TWO = {
  display: 'grid',
  gridTemplateColumns: '1fr 1fr',
  gap: '0.25rem 1.5rem',
  fontSize: '0.8125rem',
  lineHeight: 1.35,
  [NARROW]: { gridTemplateColumns: 'minmax(0, 1fr)' },
} as const;

interface SideProps {
  readonly name: string;
  readonly finding: Finding | null;
  readonly against: Finding | null;
}

function Side({ name, finding, against }: SideProps): ReactElement {
  return (
    <Box sx={{ minWidth: 0 }}>
      <Box sx={{ color: 'var(--soft)' }}>{name}</Box>
      {finding === null ? (
        <Changed is>no such finding</Changed>
      ) : (
        <>
          <Box sx={{ display: 'flex', flexWrap: 'wrap', gap: '0.125rem 0.75rem', alignItems: 'baseline' }}>
            <Changed is={finding.severity !== against?.severity}>
              <SeverityMark severity={finding.severity} />
            </Changed>
            <span style={{ fontVariantNumeric: 'tabular-nums' }}>
              {formatQuantity(finding.measured)} ·{' '}
              <Changed is={finding.limit.value !== against?.limit.value}>limit {formatQuantity(finding.limit)}</Changed>
            </span>
          </Box>
          <BasisText text={plainFields(finding.basis)} status={finding.basisStatus} />
        </>
      )}
    </Box>
  );
}

/** What differs stands on a ground of its own with a foot, so that it is seen in grey too. */
function Changed({ is, children }: { readonly is: boolean; readonly children: ReactNode }): ReactElement {
  return (
    <span
      {...(is ? { 'data-differs': '' } : {})}
      style={
        is ? { backgroundColor: 'var(--lit)', boxShadow: 'inset 0 -2px 0 var(--copper)', paddingInline: '0.25rem' } : {}
      }
    >
      {children}
    </span>
  );
}
