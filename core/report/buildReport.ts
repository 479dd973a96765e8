import { assumptionSection } from './assumptionSection.ts';
import { caseSection } from './caseSection.ts';
import { Citations } from './citations.ts';
import { proofSection, sourceSection, statementSection, testSection } from './closingSections.ts';
import { coverOf, FOOTER } from './cover.ts';
import { diagramSection } from './diagram/diagramSection.ts';
import type { Block, ReportDocument } from './document.ts';
import { findingSection } from './findingSection.ts';
import type { ReportInput } from './input.ts';
import { partSections } from './partSections.ts';
import { protectionSection } from './protectionSection.ts';
import { stringsSection } from './stringsSection.ts';
import { summarySection } from './summarySection.ts';

const PAGE: Block = { kind: 'pageBreak', orientation: 'portrait' };

/**
 * The whole paper of a job, in reading order: cover, summary, what was assumed, parts, operating cases, strings, protection,
 * findings, proof of balance, test record, sources, statement. It only arranges and words what the engine answered; a case without an answer is told in
 * words, and a case whose proof fails prints no figures.
 */
export function buildReport(input: ReportInput): ReportDocument {
  const { job, options } = input;
  const citations = new Citations();
  const body: readonly Block[] = [
    ...summarySection(input, citations),
    ...diagramSection(job, options.paper ?? 'A4'),
    ...assumptionSection(input, citations),
    ...partSections(input, citations),
    ...caseSection(input),
    ...stringsSection(input, citations),
    ...protectionSection(input, citations),
    ...findingSection(input, citations),
    ...proofSection(input),
    ...testSection(input, citations),
    ...sourceSection(citations),
    ...statementSection(),
  ];
  return {
    format: 'ohmwright-report',
    version: 1,
    title: job.title,
    subject: 'Wiring and operating report of an off-grid extra-low-voltage DC system',
    author: job.preparedBy ?? '',
    language: 'en-GB',
    paper: options.paper ?? 'A4',
    preparedOn: options.preparedOn ?? null,
    program: `Ohmwright ${options.programVersion}`,
    footer: FOOTER,
    blocks: [coverOf(input), PAGE, ...body],
  };
}
