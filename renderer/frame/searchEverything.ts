/** What the box that finds anything can find in the open job, and how one gets there. */
import type { Finding, Part } from '../../core/api.ts';
import { junctionsOf } from '../../core/api.ts';
import { kindWord } from '../controls/words.ts';
import { goToFinding } from '../stages/findings/findingsView.ts';
import { useOpenJob } from '../state/openJob.ts';
import { stages, useSession } from '../state/session.ts';
import { leaveJob } from './openings.ts';
import { stageWords } from './Spine.tsx';
import { downloadJob } from './saving.ts';

export interface Hit {
  /** Typed in full, it stands first. */
  readonly id?: string;
  readonly name: string;
  /** What it is, in a word. */
  readonly kind: string;
  readonly go: () => void | Promise<void>;
}

const MOST_HITS = 12;

/** All words of the text must be there; earlier in the name stands higher. */
export function searchEverything(text: string): readonly Hit[] {
  const words = text.toLowerCase().split(/\s+/).filter(Boolean);
  const ranked = everything().flatMap((hit) => {
    const name = `${hit.name} ${hit.kind}`.toLowerCase();
    const places = words.map((word) => name.indexOf(word));
    if (places.some((place) => place < 0)) return [];
    const isIt = hit.id?.toLowerCase() === text.trim().toLowerCase();
    return [{ hit, rank: isIt ? -1 : places.reduce((sum, place) => sum + place, 0) }];
  });
  ranked.sort((a, b) => a.rank - b.rank || a.hit.name.length - b.hit.name.length);
  return ranked.slice(0, MOST_HITS).map(({ hit }) => hit);
}

function everything(): readonly Hit[] {
  const { job, answers } = useOpenJob.getState();
  const junctions = [...new Set(job.parts.flatMap(junctionsOf))];
  return [
    ...actions(),
    ...job.parts.map(partHit),
    ...junctions.map((junction) => ({
      id: junction,
      name: junction,
      kind: 'junction',
      go: () => inWiring(() => useOpenJob.getState().select({ junctions: [junction] })),
    })),
    ...(answers?.report.findings ?? []).map(findingHit),
  ];
}

function partHit(part: Part): Hit {
  return {
    id: part.id,
    name: part.label === undefined ? part.id : `${part.id}, ${part.label}`,
    kind: kindWord(part.kind),
    go: () => inWiring(() => useOpenJob.getState().select({ parts: [part.id] })),
  };
}

function findingHit(finding: Finding): Hit {
  return {
    name: finding.message,
    kind: finding.severity,
    go: () => goToFinding(finding),
  };
}

/** The person goes on in the ledger of what was found. */
function inWiring(then: () => void): void {
  useSession.getState().goStage('wiring', 'ledger');
  then();
}

function actions(): readonly Hit[] {
  const { undo, redo } = useOpenJob.getState();
  return [
    ...stages.map((stage) => ({
      name: `Go to ${stageWords[stage].name}`,
      kind: 'stage',
      go: () => useSession.getState().goStage(stage),
    })),
    { name: 'Undo', kind: 'action', go: undo },
    { name: 'Do again', kind: 'action', go: redo },
    { name: 'Download the job file', kind: 'action', go: downloadJob },
    { name: 'Back to the list of jobs', kind: 'action', go: leaveJob },
  ];
}
