/** The findings that name a part, worst first, and the checks of it that could not be made. */
import type { ReactElement } from 'react';
import { caseById, type Finding, type NotChecked, type Part, plainFields, SEVERITIES } from '../../core/api.ts';
import { SmallButton } from '../controls/AskRow.tsx';
import { BasisText } from '../controls/BasisText.tsx';
import { Folded } from '../controls/Folded.tsx';
import { NotDoneMark, SeverityMark } from '../controls/SeverityMark.tsx';
import { goToFindingsOf } from '../stages/findings/findingsView.ts';
import { useOpenJob } from '../state/openJob.ts';
import { caseWords } from './chosenCase.ts';
import { Buttons, Section, SectionTitle } from './parts.tsx';

export function FindingsHere({ part }: { readonly part: Part }): ReactElement | null {
  const report = useOpenJob((open) => open.answers?.report);
  const names = (parts: readonly string[]): boolean =>
    parts.some((id) => id === part.id || id === `${part.id}.plus` || id === `${part.id}.minus`);
  const findings = (report?.findings ?? []).filter(({ parts }) => names(parts));
  const notDone = (report?.notChecked ?? []).filter(({ parts }) => names(parts));
  if (findings.length + notDone.length === 0) return null;
  const worstFirst = SEVERITIES.flatMap((severity) => findings.filter((finding) => finding.severity === severity));
  return (
    <Section aria-label="Findings">
      <SectionTitle>{findings.length === 0 ? 'No finding names it' : 'Findings'}</SectionTitle>
      {worstFirst.map((finding) => (
        <FindingLines key={`${finding.rule} ${finding.case} ${finding.message}`} finding={finding} />
      ))}
      {notDone.length > 0 && <NotDoneList rows={notDone} />}
      <Buttons>
        <SmallButton type="button" onClick={() => goToFindingsOf(part.id)}>
          To the findings
        </SmallButton>
      </Buttons>
    </Section>
  );
}

function FindingLines({ finding }: { readonly finding: Finding }): ReactElement {
  const job = useOpenJob((open) => open.answers?.job ?? open.job);
  const operatingCase = caseById(job, finding.case);
  return (
    <div style={{ paddingBlock: '0.25rem', fontSize: '0.875rem', lineHeight: 1.45 }}>
      <SeverityMark severity={finding.severity} />
      {operatingCase !== undefined && (
        <span style={{ color: 'var(--soft)' }}>{` in “${caseWords(operatingCase)}”`}</span>
      )}
      <div>{plainFields(finding.message)}</div>
      <div>{plainFields(finding.remedy)}</div>
      <BasisText text={finding.basis} status={finding.basisStatus} />
    </div>
  );
}

function NotDoneList({ rows }: { readonly rows: readonly NotChecked[] }): ReactElement {
  return (
    <Folded title="Checks not done" aside={String(rows.length)}>
      {rows.map((row) => (
        <div key={`${row.rule} ${row.missing}`} style={{ fontSize: '0.875rem', paddingBlock: '0.125rem' }}>
          <NotDoneMark /> {`wants ${plainFields(row.missing)}`}
        </div>
      ))}
    </Folded>
  );
}
