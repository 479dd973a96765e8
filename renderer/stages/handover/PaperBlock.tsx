/** One block of the paper on the screen, in the paper's own look. */
import Box from '@mui/material/Box';
import type { ReactElement, ReactNode } from 'react';
import type { Block, CoverBlock, EntryBlock, Fact, ListBlock, SourcesBlock } from '../../../core/api.ts';
import { SeverityMark } from '../../controls/SeverityMark.tsx';
import { PaperFigure } from './PaperFigure.tsx';
import { PaperTable } from './PaperTable.tsx';

export function PaperBlock({ block }: { readonly block: Block }): ReactElement | null {
  switch (block.kind) {
    case 'cover':
      return <Cover cover={block} />;
    case 'heading':
      return <Heading level={block.level}>{block.text}</Heading>;
    case 'paragraph':
      return <Box sx={TONES[block.tone]}>{block.text}</Box>;
    case 'list':
      return <Items list={block} />;
    case 'caution':
      return (
        <Box sx={{ borderLeft: '2px solid var(--copper)', paddingLeft: '0.75rem', my: '0.75rem' }}>
          <Box sx={{ fontWeight: 600 }}>Caution — {block.title.charAt(0).toLowerCase() + block.title.slice(1)}</Box>
          <Items list={{ kind: 'list', ordered: false, items: block.points }} />
        </Box>
      );
    case 'facts':
      return <Facts facts={block.facts} labelWidth="11rem" />;
    case 'entry':
      return <Entry entry={block} />;
    case 'table':
      return <PaperTable table={block} />;
    case 'figure':
      return <PaperFigure figure={block} />;
    case 'sources':
      return <Sources sources={block} />;
    case 'pageBreak':
      return null;
  }
}

const TONES = {
  lead: { fontSize: '1.0625rem', my: '0.5rem', maxWidth: '46rem' },
  body: { my: '0.5rem', maxWidth: '46rem' },
  small: { fontSize: '0.875rem', color: 'var(--soft)', my: '0.375rem', maxWidth: '46rem' },
} as const;

/** The stage has the first and second level: the paper's headings stand below them. */
function Heading({ level, children }: { readonly level: 1 | 2 | 3; readonly children: ReactNode }): ReactElement {
  const look = HEADINGS[level];
  return (
    <Box component={look.tag} sx={{ ...look.sx, lineHeight: 1.25 }}>
      {children}
    </Box>
  );
}

const HEADINGS = {
  1: {
    tag: 'h3',
    sx: {
      m: 0,
      mb: '0.75rem',
      pt: '0.5rem',
      fontSize: '1.5rem',
      fontWeight: 600,
      borderTop: '2px solid var(--copper)',
    },
  },
  2: { tag: 'h4', sx: { m: 0, mt: '1.25rem', mb: '0.375rem', fontSize: '1.125rem', fontWeight: 600 } },
  3: { tag: 'h5', sx: { m: 0, mt: '0.75rem', mb: '0.25rem', fontSize: '1rem', fontWeight: 600 } },
} as const;

function Cover({ cover }: { readonly cover: CoverBlock }): ReactElement {
  return (
    <Box>
      <Box component="h3" sx={{ m: 0, fontSize: '2rem', fontWeight: 600, lineHeight: 1.2 }}>
        {cover.title}
      </Box>
      <Box sx={{ color: 'var(--copper)', mb: '1.25rem' }}>{cover.subtitle}</Box>
      <Facts facts={cover.facts} labelWidth="9rem" />
      {cover.statement.map((words) => (
        <Box key={words} sx={TONES.body}>
          {words}
        </Box>
      ))}
      <Facts facts={cover.blanks.map((label) => ({ label, value: '' }))} labelWidth="16rem" />
    </Box>
  );
}

interface FactsProps {
  readonly facts: readonly Fact[];
  readonly labelWidth: string;
  readonly tight?: boolean;
}

function Facts({ facts, labelWidth, tight = false }: FactsProps): ReactElement {
  const padding = tight ? '0.0625rem 0' : '0.25rem 0';
  return (
    <Box component="dl" sx={{ m: 0, my: tight ? 0 : '0.75rem' }}>
      {facts.map(({ label, value }, index) => (
        <Box
          // biome-ignore lint/suspicious/noArrayIndexKey: facts of a finished paper never move, and labels may repeat
          key={index}
          sx={{
            display: 'grid',
            gridTemplateColumns: `minmax(5rem, ${labelWidth}) minmax(0, 1fr)`,
            gap: '0.75rem',
            borderBottom: tight ? 'none' : '1px solid var(--hair)',
            padding,
          }}
        >
          <Box component="dt" sx={{ color: 'var(--soft)' }}>
            {label}
          </Box>
          <Box component="dd" sx={{ m: 0, overflowWrap: 'anywhere', whiteSpace: 'pre-line' }}>
            {value === '' ? <Blank /> : value}
          </Box>
        </Box>
      ))}
    </Box>
  );
}

/** A place for the pen. */
export function Blank(): ReactElement {
  return (
    <Box
      component="span"
      sx={{ display: 'inline-block', minWidth: '4rem', width: '100%', borderBottom: '1px dotted var(--edge)' }}
    >
      <span className="only-read">left empty for the pen</span>
    </Box>
  );
}

function Items({ list }: { readonly list: ListBlock }): ReactElement {
  return (
    <Box component={list.ordered ? 'ol' : 'ul'} sx={{ my: '0.375rem', paddingLeft: '1.5rem', maxWidth: '46rem' }}>
      {list.items.map((item) => (
        <li key={item}>{item}</li>
      ))}
    </Box>
  );
}

function Entry({ entry }: { readonly entry: EntryBlock }): ReactElement {
  return (
    <Box
      sx={{
        display: 'grid',
        gridTemplateColumns: '2rem 5rem minmax(0, 1fr)',
        gap: '0.25rem 0.5rem',
        borderTop: '1px solid var(--hair)',
        padding: '0.5rem 0',
      }}
    >
      <Box sx={{ textAlign: 'right', fontVariantNumeric: 'tabular-nums' }}>{entry.number}</Box>
      <SeverityMark severity={entry.mark} />
      <Box>
        <Box sx={{ fontWeight: 600 }}>{entry.title}</Box>
        <Facts facts={entry.facts} labelWidth="5rem" tight />
      </Box>
    </Box>
  );
}

function Sources({ sources }: { readonly sources: SourcesBlock }): ReactElement {
  return (
    <Box component="ul" sx={{ m: 0, my: '0.5rem', p: 0, listStyle: 'none' }}>
      {sources.items.map(({ number, text, status }) => (
        <Box component="li" key={number} sx={{ display: 'grid', gridTemplateColumns: '2.5rem minmax(0, 1fr)' }}>
          <span>[{number}]</span>
          <span>{text.endsWith(status) ? text : `${text} — ${status}`}</span>
        </Box>
      ))}
    </Box>
  );
}
