/** The PDF as the host makes it, kept until the job, the paper or the date changes. */
import { useRef, useState } from 'react';
import { draftText } from '../../../core/api.ts';
import type { PdfRequest, WrittenFile } from '../../../core/host.ts';
import { useOpenJob } from '../../state/openJob.ts';
import { useChannel } from '../../state/session.ts';
import { bytesOf } from './pdfPages.ts';

export interface MadePdf {
  readonly name: string;
  readonly bytes: Uint8Array<ArrayBuffer>;
  /** What it was made of; it is out of date where that no longer holds. */
  readonly generation: number;
  readonly paper: PdfRequest['paper'];
  readonly preparedOn: string;
}

export interface Pdf {
  readonly busy: 'making' | 'saving' | null;
  readonly made: MadePdf | null;
  readonly written: WrittenFile | null;
  readonly trouble: string | null;
  readonly make: () => Promise<void>;
  readonly save: () => Promise<void>;
  readonly show: () => Promise<void>;
  /** Waits no longer; what comes after all is dropped. */
  readonly leaveOff: () => void;
}

type Request = Pick<PdfRequest, 'paper' | 'preparedOn'>;

export function usePdf(request: Request): Pdf {
  const channel = useChannel();
  const [busy, setBusy] = useState<Pdf['busy']>(null);
  const [made, setMade] = useState<MadePdf | null>(null);
  const [written, setWritten] = useState<WrittenFile | null>(null);
  const [trouble, setTrouble] = useState<string | null>(null);
  const turn = useRef(0);

  const begin = (what: 'making' | 'saving'): number => {
    setBusy(what);
    setTrouble(null);
    setWritten(null);
    turn.current += 1;
    return turn.current;
  };

  const make = async (): Promise<void> => {
    const mine = begin('making');
    const { draft, generation } = useOpenJob.getState();
    const answer = await channel.call('reports.pdf', { ...request, text: draftText(draft) });
    if (turn.current !== mine) return;
    setBusy(null);
    if (!answer.ok) return setTrouble(answer.trouble.message);
    setMade({ ...request, name: answer.value.name, bytes: bytesOf(answer.value.base64), generation });
  };

  const save = async (): Promise<void> => {
    const mine = begin('saving');
    const answer = await channel.call('reports.save', { ...request, text: draftText(useOpenJob.getState().draft) });
    if (turn.current !== mine) return;
    setBusy(null);
    if (!answer.ok) setTrouble(answer.trouble.message);
    else setWritten(answer.value);
  };

  const show = async (): Promise<void> => {
    if (written === null) return;
    const answer = await channel.call('files.show', { path: written.path });
    setTrouble(answer.ok ? null : answer.trouble.message);
  };

  const leaveOff = (): void => {
    turn.current += 1;
    setBusy(null);
  };
  return { busy, made, written, trouble, make, save, show, leaveOff };
}
