/** Does the bank work as one? The answer for a case first; what flows at rest, what could be changed and how sure it is under it. */
import Box from '@mui/material/Box';
import Button from '@mui/material/Button';
import Typography from '@mui/material/Typography';
import { type ReactElement, useMemo } from 'react';
import { type BandStudy, plainFields } from '../../../core/api.ts';
import { Hatches } from '../../charts/Hatches.tsx';
import { Folded } from '../../controls/Folded.tsx';
import { Quiet, Said } from '../../controls/Prose.tsx';
import { SeverityMark } from '../../controls/SeverityMark.tsx';
import { useOpenJob } from '../../state/openJob.ts';
import { useSession } from '../../state/session.ts';
import type { BankNow, InCase } from '../../workers/stringsMessages.ts';
import { AtRestFold } from './AtRestFold.tsx';
import { BandFold } from './BandFold.tsx';
import { CaseRow, ModelRow } from './CaseRow.tsx';
import { ChangesFold, proposalOf } from './ChangesFold.tsx';
import { DriftFold } from './DriftFold.tsx';
import { JoiningFold } from './JoiningFold.tsx';
import { LayoutsFold } from './LayoutsFold.tsx';
import { OneOutFold } from './OneOutFold.tsx';
import { ReadingsFold } from './ReadingsFold.tsx';
import { LoneString, Shares } from './Shares.tsx';
import { useStringsView } from './stringsView.ts';
import { useStudy } from './studies.ts';
import { type Tags, tagsOf } from './tags.ts';
import { isLone, sharingTitle, worstOf } from './words.ts';

export function StringsStage(): ReactElement {
  const hasStrings = useOpenJob((open) => open.job.parts.some(({ kind }) => kind === 'string'));
  const now = useStudy('now', hasStrings ? NOTHING_ASKED : null, hasStrings);
  return (
    <Box sx={{ position: 'relative', height: '100%', minHeight: 0, overflow: 'auto', padding: '0.75rem 1.5rem 2rem' }}>
      <Hatches />
      {!hasStrings && <NoString />}
      {hasStrings && now.last === null && (
        <>
          <Typography component="h1" variant="h1">
            Strings
          </Typography>
          {now.state?.status === 'failed' ? (
            <Box role="alert">There is no answer: {now.state.message}</Box>
          ) : (
            <Said>The bank is being solved …</Said>
          )}
        </>
      )}
      {hasStrings && now.last !== null && (
        <>
          {now.state?.status === 'failed' && (
            <Box role="alert" sx={{ color: 'var(--stop)', mb: '0.5rem' }}>
              There are no new answers: {now.state.message}
            </Box>
          )}
          <BankStudies now={now.last} isOld={now.answer === null} />
        </>
      )}
    </Box>
  );
}

const NOTHING_ASKED = {};

function NoString(): ReactElement {
  return (
    <>
      <Typography component="h1" variant="h1">
        No battery string yet
      </Typography>
      <Said>
        A string is one block, or several in series. Draw one in the wiring, and a second beside it: this stage then
        shows whether the two work as one.
      </Said>
      <Button variant="contained" onClick={() => useSession.getState().goStage('wiring')}>
        Go to the wiring
      </Button>
    </>
  );
}

/** Draws of a band: enough that its edges stand to about a hundredth of its width. */
const DRAWS = 500;
const SEED = 1;

interface BankStudiesProps {
  readonly now: BankNow;
  /** Of the job before the last edit. */
  readonly isOld: boolean;
}

function BankStudies({ now, isOld }: BankStudiesProps): ReactElement {
  const job = useOpenJob((open) => open.job);
  const chosen = useOpenJob((open) => open.caseId);
  const view = useStringsView();
  const { model } = view;
  const tags = useMemo(() => tagsOf(job, now.banks), [job, now.banks]);
  const caseId = now.cases.has(chosen) ? chosen : 'at-rest';
  const inCase = now.cases.get(caseId);
  const sharing = inCase?.[model];
  const banks = inCase?.banks ?? now.banks;
  const hasSeveral = !banks.every(isLone);
  const asks: InCase = { caseId, model };
  const worst = sharing === undefined ? null : worstOf(sharing, banks);
  const isJudged = worst !== null;
  const shareLimit = job.settings.shareLimit;
  const isUneven = Math.abs(worst?.deviation ?? 0) > shareLimit;

  const oneOut = useStudy('oneOut', hasSeveral ? asks : null, hasSeveral);
  const changes = useStudy('changes', isJudged ? asks : null, isUneven || view.open.has('changes'));
  const layouts = useStudy('layouts', hasSeveral ? asks : null, view.open.has('layouts'));
  const band = useStudy(
    'band',
    hasSeveral ? { ...asks, draws: DRAWS, seed: SEED } : null,
    isJudged || view.open.has('band'),
  );

  if (sharing === undefined) return <Said>This case is being solved …</Said>;
  const best = changes.answer === null ? null : proposalOf(changes.answer, shareLimit);
  const picked = changes.answer?.find(({ label }) => label === view.picked) ?? null;
  const proposed = picked ?? (isUneven ? best : null);
  return (
    <Box aria-busy={isOld} sx={isOld ? OLD : FRESH}>
      <Box sx={{ display: 'flex', flexWrap: 'wrap', gap: '0.25rem 1.5rem', alignItems: 'center' }}>
        <Typography component="h1" variant="h1" aria-live="polite" sx={{ flex: '1 1 24rem' }}>
          {sharingTitle({ sharing, banks, tags, shareLimit, isSure: band.answer?.verdict.holds !== false })}
        </Typography>
        <ModelRow model={model} />
      </Box>
      <CaseRow now={now} caseId={caseId} model={model} tags={tags} />
      {band.answer !== null && isJudged && <HowSure verdict={band.answer.verdict} />}
      {sharing.outcome === 'solved' ? (
        <Shares
          sharing={sharing}
          banks={banks}
          tags={tags}
          band={band.answer}
          proposed={proposed}
          instead={
            <Instead
              hasSeveral={hasSeveral}
              isJudged={isJudged}
              isUneven={isUneven}
              isWaiting={changes.state?.status === 'waiting'}
            />
          }
        />
      ) : (
        <NoPoint caseId={caseId} />
      )}
      <Box sx={{ mt: '0.5rem' }}>
        {hasSeveral && <AtRestFold atRest={now.atRest} tags={tags} />}
        {isJudged && <ChangesFold study={changes} proposed={proposed} tags={tags} />}
        {isJudged && <LayoutsFold study={layouts} tags={tags} />}
        {hasSeveral && <OneOutFold study={oneOut} tags={tags} />}
        <JoiningFold job={job} now={now} tags={tags} />
        {isJudged && <BandFold study={band} tags={tags} />}
        <DriftFold job={job} tags={tags} usual={now.usualCycle} />
        <ReadingsFold read={now.fromReadings} series={now.series} caseId={caseId} tags={tags} />
        <Names tags={tags} />
      </Box>
    </Box>
  );
}

function Names({ tags }: { readonly tags: Tags }): ReactElement | null {
  const long = [...tags.values()].filter(({ tag, name }) => name !== tag && name !== `String ${tag}`);
  if (long.length === 0) return null;
  return (
    <Folded title="Which string is which" aside={long.map(({ tag }) => tag).join(', ')}>
      {long.map(({ id, tag, name }) => (
        <Quiet key={id}>
          <strong>{tag}</strong> {name}
          {id === tag ? '' : ` (${id})`}
        </Quiet>
      ))}
    </Folded>
  );
}

/** What the range of the assumed figures makes of the answer above. */
function HowSure({ verdict: { holds, text } }: { readonly verdict: BandStudy['verdict'] }): ReactElement {
  return (
    <Said style={{ fontSize: '0.875rem', color: holds ? 'var(--soft)' : 'var(--ink)' }}>
      {!holds && (
        <>
          <SeverityMark severity="look" bare />{' '}
        </>
      )}
      {plainFields(text)}
    </Said>
  );
}

/** Figures of the job before the last edit stand back while the next are on their way; a short wait is not shown. */
const OLD = { opacity: 0.55, transition: 'opacity 0s linear 0.3s' } as const;
const FRESH = { opacity: 1 } as const;

interface InsteadProps {
  readonly hasSeveral: boolean;
  readonly isJudged: boolean;
  readonly isUneven: boolean;
  readonly isWaiting: boolean;
}

/** What stands where the proposed bank would. */
function Instead({ hasSeveral, isJudged, isUneven, isWaiting }: InsteadProps): ReactElement {
  if (!hasSeveral) return <LoneString isCalm={false} />;
  if (!isJudged) {
    return (
      <Quiet>
        In this case the bank as a whole carries less than a fiftieth of its capacity an hour, so there is nothing to
        judge its sharing by. What its strings push into each other is told under “At rest”; choose a case with more
        load or charge to see how they share.
      </Quiet>
    );
  }
  if (!isUneven) return <LoneString isCalm />;
  return (
    <Quiet>
      {isWaiting
        ? 'Changes are being tried on a copy of the job …'
        : 'None of the changes that were tried makes it more even.'}
    </Quiet>
  );
}

function NoPoint({ caseId }: { readonly caseId: string }): ReactElement {
  const message = useOpenJob((open) => open.answers?.points.get(caseId)?.collapse?.message);
  return (
    <Said>
      {message ?? 'The network has no answer in this case.'}{' '}
      <Button onClick={() => useSession.getState().goStage('findings')} sx={{ textDecoration: 'underline' }}>
        Read it in the findings
      </Button>
    </Said>
  );
}
