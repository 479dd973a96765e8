/** The tools over the drawing: palette, tidy, fit, zoom, and what is shown. */
import { styled } from '@mui/material/styles';
import { useReactFlow } from '@xyflow/react';
import type { ReactElement } from 'react';
import { useOpenJob } from '../state/openJob.ts';
import { tidy } from './edits.ts';
import { useFit } from './useFit.ts';
import { useView } from './view.ts';

const Bar = styled('div')({
  display: 'flex',
  flexWrap: 'wrap',
  alignItems: 'center',
  gap: '0.25rem',
  padding: '0.25rem 0.5rem',
  borderBottom: '1px solid var(--hair)',
  '& .space': { flex: 1 },
  '& .divide': { width: 1, alignSelf: 'stretch', background: 'var(--hair)', margin: '0 0.25rem' },
});
const Tool = styled('button')({
  font: 'inherit',
  fontSize: '0.875rem',
  color: 'var(--ink)',
  background: 'transparent',
  border: '1px solid transparent',
  borderRadius: 3,
  padding: '0.2rem 0.5rem',
  cursor: 'pointer',
  '&:hover': { background: 'var(--lit)' },
  '&[aria-pressed="true"]': { borderColor: 'var(--edge)', background: 'var(--sheet)' },
  '&:disabled': { color: 'var(--soft)', cursor: 'default', background: 'transparent' },
  '@media (pointer: coarse)': { minHeight: 44, minWidth: 44 },
});

export function Toolbar(): ReactElement {
  const view = useView();
  const { zoomIn, zoomOut } = useReactFlow();
  const fitWhole = useFit();
  const isEmpty = useOpenJob((open) => open.job.parts.length === 0);
  const toggle = (what: 'palette' | 'volts' | 'amps' | 'labels' | 'walk') => useView.setState({ [what]: !view[what] });
  return (
    <Bar role="toolbar" aria-label="Drawing">
      <Tool type="button" aria-pressed={view.palette} onClick={() => toggle('palette')}>
        Palette
      </Tool>
      <span className="divide" />
      <Tool
        type="button"
        disabled={isEmpty}
        title="Lays the whole drawing out anew; undo brings the old one back"
        onClick={() => {
          tidy();
          requestAnimationFrame(() => fitWhole());
        }}
      >
        Tidy
      </Tool>
      <Tool type="button" disabled={isEmpty} title="Fit the whole drawing into view (0)" onClick={() => fitWhole()}>
        Fit
      </Tool>
      <Tool type="button" aria-label="Zoom out" title="Zoom out (−)" onClick={() => void zoomOut()}>
        −
      </Tool>
      <Tool type="button" aria-label="Zoom in" title="Zoom in (+)" onClick={() => void zoomIn()}>
        +
      </Tool>
      <span className="space" />
      <Tool type="button" aria-pressed={view.volts} onClick={() => toggle('volts')}>
        Volts
      </Tool>
      <Tool type="button" aria-pressed={view.amps} onClick={() => toggle('amps')}>
        Amps
      </Tool>
      <Tool type="button" aria-pressed={view.labels} onClick={() => toggle('labels')}>
        Labels
      </Tool>
      <Tool type="button" aria-pressed={view.walk} onClick={() => toggle('walk')}>
        Volt walk
      </Tool>
    </Bar>
  );
}
