/** The balance line at the foot, always: that what goes in comes out, and how nearly. */
import Box from '@mui/material/Box';
import type { ReactElement } from 'react';
import { formatQuantity, type OperatingPoint, type Proof } from '../../core/api.ts';
import type { Answers } from '../state/answers.ts';
import { useOpenJob } from '../state/openJob.ts';

export function BalanceLine(): ReactElement {
  const answers = useOpenJob((job) => job.answers);
  const caseId = useOpenJob((job) => job.caseId);
  const trouble = useOpenJob((job) => job.solverTrouble);
  const isOld = useOpenJob((job) => job.answers !== null && job.answers.generation !== job.generation);
  return (
    <Box
      component="footer"
      aria-label="Balance line"
      sx={{
        gridArea: 'foot',
        borderTop: '1px solid var(--hair)',
        px: 2,
        py: 0.75,
        minHeight: '2rem',
        fontSize: '0.875rem',
        fontVariantNumeric: 'tabular-nums',
        color: isOld ? 'var(--soft)' : 'var(--ink)',
      }}
    >
      {trouble === null ? balance(answers, caseId) : `No answer: ${trouble}`}
    </Box>
  );
}

function balance(answers: Answers | null, caseId: string): string {
  const point = answers?.points.get(caseId);
  if (answers === null || point === undefined) return 'Solving …';
  return point.outcome === 'solved' ? solvedText(point.proof, answers) : unsolvedText(point);
}

function solvedText(proof: Proof, { ms }: Answers): string {
  const watts = (value: number): string => formatQuantity({ value, unit: 'W', digits: 5, prefix: false });
  const remainder = `${Math.abs(proof.worstJunctionA).toFixed(3)} A`;
  const time = `${ms.solve < 10 ? ms.solve.toFixed(1) : ms.solve.toFixed(0)} ms`;
  return `in ${watts(proof.powerInW)} = out ${watts(proof.powerOutW)} + heat ${watts(proof.heatW)}  ·  largest junction remainder ${remainder}  ·  solved in ${time}`;
}

function unsolvedText({ outcome, collapse }: OperatingPoint): string {
  if (outcome === 'collapse')
    return `No balance in this case: ${collapse?.message ?? 'a load asks for more than can be delivered'}`;
  return 'Nothing to balance: no source feeds anything in this case.';
}
