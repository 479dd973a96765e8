/** What will be printed, in order: the sections at the side, the one that is turned up as a sheet. Not page by page as on paper. */
import Box from '@mui/material/Box';
import Button from '@mui/material/Button';
import ButtonBase from '@mui/material/ButtonBase';
import Typography from '@mui/material/Typography';
import { type ReactElement, useMemo, useRef, useState } from 'react';
import { PaperBlock } from './PaperBlock.tsx';
import { pdfPages } from './pdfPages.ts';
import { type Section, sectionsOf } from './sections.ts';
import type { Paper } from './usePaper.ts';
import type { MadePdf } from './usePdf.ts';

export interface PaperPreviewProps {
  readonly paper: Paper;
  /** The PDF, where it was made of just this: it tells the page numbers. */
  readonly made: MadePdf | null;
}

export function PaperPreview({ paper, made }: PaperPreviewProps): ReactElement {
  const { document, trouble, busy } = paper;
  const sections = useMemo(() => (document === null ? [] : sectionsOf(document)), [document]);
  const pages = useMemo(
    () =>
      made === null
        ? null
        : pdfPages(
            made.bytes,
            sections.map(({ title }) => title),
          ).firstPages,
    [made, sections],
  );
  const [wanted, setWanted] = useState(0);
  const sheet = useRef<HTMLDivElement>(null);
  const at = Math.min(wanted, Math.max(0, sections.length - 1));
  const turn = (to: number): void => {
    setWanted(to);
    sheet.current?.scrollTo({ top: 0 });
  };
  const section = sections[at];
  return (
    <Box component="section" aria-labelledby="what-will-be-printed" aria-busy={busy}>
      <Typography component="h2" variant="h2" id="what-will-be-printed">
        What will be printed, in order
      </Typography>
      <Box sx={{ color: 'var(--soft)', mb: '0.5rem' }}>
        {busy
          ? 'The preview follows the job …'
          : 'Words, tables and figures are those of the PDF; where its pages break, the PDF itself shows.'}
      </Box>
      {trouble !== null && <Box role="alert">{trouble}</Box>}
      {section !== undefined && (
        <Box sx={{ display: 'flex', flexWrap: 'wrap', gap: '1rem', alignItems: 'flex-start' }}>
          <Contents sections={sections} pages={pages} at={at} onTurn={turn} />
          <Box sx={{ flex: '999 1 24rem', minWidth: 0 }}>
            <Turning at={at} sections={sections} onTurn={turn} />
            <Box
              ref={sheet}
              component="section"
              aria-label={`${section.title}, as it will be printed`}
              tabIndex={0}
              sx={{
                backgroundColor: 'var(--sheet)',
                border: '1px solid var(--hair)',
                padding: '1.5rem 2rem 2rem',
                maxWidth: section.landscape ? '72rem' : '56rem',
                maxHeight: '75vh',
                overflow: 'auto',
              }}
            >
              {section.blocks.map((block, index) => (
                // biome-ignore lint/suspicious/noArrayIndexKey: blocks of a finished paper never move
                <PaperBlock key={index} block={block} />
              ))}
            </Box>
          </Box>
        </Box>
      )}
    </Box>
  );
}

interface TurnProps {
  readonly sections: readonly Section[];
  readonly at: number;
  readonly onTurn: (to: number) => void;
}

function Contents({
  sections,
  pages,
  at,
  onTurn,
}: TurnProps & { readonly pages: readonly (number | null)[] | null }): ReactElement {
  return (
    <Box component="nav" aria-label="Sections of the paper" sx={{ flex: '1 1 12rem', maxWidth: '20rem' }}>
      <Box component="ol" sx={{ m: 0, p: 0, listStyle: 'none' }}>
        {sections.map(({ title }, index) => {
          const page = pages?.[index] ?? null;
          return (
            <li key={title}>
              <ButtonBase
                aria-current={index === at ? 'true' : undefined}
                onClick={() => onTurn(index)}
                sx={{ ...CONTENTS_LINE, ...(index === at ? HERE : {}) }}
              >
                <span>{title}</span>
                <Box component="span" sx={{ color: 'var(--soft)', whiteSpace: 'nowrap' }}>
                  {page === null ? '' : `page ${String(page)}`}
                </Box>
              </ButtonBase>
            </li>
          );
        })}
      </Box>
    </Box>
  );
}

const CONTENTS_LINE = {
  display: 'flex',
  justifyContent: 'space-between',
  gap: '0.5rem',
  width: '100%',
  textAlign: 'left',
  font: 'inherit',
  minHeight: '1.75rem',
  padding: '0.125rem 0.5rem',
  borderLeft: '3px solid transparent',
  '&:hover': { backgroundColor: 'var(--lit)' },
  '&.Mui-focusVisible': { outline: '2px solid var(--volt)', outlineOffset: -2 },
  '@media (pointer: coarse)': { minHeight: 44 },
} as const;
const HERE = { borderLeftColor: 'var(--copper)', backgroundColor: 'var(--sheet)', fontWeight: 600 } as const;

function Turning({ sections, at, onTurn }: TurnProps): ReactElement {
  return (
    <Box sx={{ display: 'flex', alignItems: 'center', gap: '0.5rem', mb: '0.375rem' }}>
      <Button variant="outlined" disabled={at === 0} onClick={() => onTurn(at - 1)}>
        Section before
      </Button>
      <Button variant="outlined" disabled={at >= sections.length - 1} onClick={() => onTurn(at + 1)}>
        Next section
      </Button>
      <Box component="span" aria-live="polite" sx={{ color: 'var(--soft)' }}>
        {at + 1} of {sections.length}
      </Box>
    </Box>
  );
}
