/** What a job is printed as: the report and the lists. */
import { buildList, withPractice } from '../../core/api.ts';
import type { ListKind, PdfRequest } from '../../core/host.ts';
import { tables } from '../../data/index.ts';
import { type Bench, solvableJob } from './bench.ts';
import { csvText } from './csv.ts';
import { fileStem } from './fileName.ts';
import type { FileDesk } from './fileServices.ts';
import { makeReport, pdfOf } from './makeReport.ts';
import type { Doing } from './services.ts';
import { solveCases } from './solveCases.ts';

type PaperMethods = 'reports.pdf' | 'reports.save' | 'lists.csv';

export function paperServices({ about }: Bench, desk: FileDesk): { readonly [M in PaperMethods]: Doing<M> } {
  return {
    'reports.pdf': async (ask) => {
      const { name, bytes } = await reportOf(ask, about.version);
      return { name, base64: Buffer.from(bytes).toString('base64') };
    },
    'reports.save': async (ask) => {
      const { name, bytes } = await reportOf(ask, about.version);
      return await desk.save({ suggestedName: name, kind: 'pdf', content: bytes });
    },
    'lists.csv': ({ text, list }) => {
      const job = solvableJob(text);
      const { headings, rows } = buildList({ job, tables, points: solveCases(job, job.cases), list });
      return { name: listName(job.title, list), csv: csvText([headings, ...rows]) };
    },
  };
}

interface ReportFile {
  readonly name: string;
  readonly bytes: Uint8Array;
}

async function reportOf(
  { text, paper, preparedOn, practice }: PdfRequest,
  programVersion: string,
): Promise<ReportFile> {
  const asDrawn = solvableJob(text);
  const job = practice === undefined ? asDrawn : withPractice(asDrawn, practice);
  const { document } = makeReport({ job, cases: job.cases, options: { programVersion, preparedOn, paper } });
  return { name: `${fileStem(job.title)}.pdf`, bytes: await pdfOf(document) };
}

const listEndings: Readonly<Record<ListKind, string>> = { cables: 'cut list', fuses: 'fuse list', parts: 'parts list' };

function listName(title: string, list: ListKind): string {
  return `${fileStem(title)} - ${listEndings[list]}.csv`;
}
