/** A table of the paper on the screen. */
import Box from '@mui/material/Box';
import type { ReactElement } from 'react';
import type { Cell, Column, TableBlock } from '../../../core/api.ts';
import { SeverityMark } from '../../controls/SeverityMark.tsx';

/** Rows shown here; the paper has them all. */
const MOST_ROWS = 120;

export function PaperTable({ table }: { readonly table: TableBlock }): ReactElement {
  const rest = table.rows.length - MOST_ROWS;
  return (
    // A region of its own that can be reached and scrolled by keyboard where the table is wider than the sheet.
    <Box component="section" aria-label={table.caption} tabIndex={0} sx={{ my: '0.75rem', overflowX: 'auto' }}>
      <Box component="table" sx={{ ...TABLE, fontSize: table.dense === true ? '0.8125rem' : '0.875rem' }}>
        <Box component="caption" sx={{ textAlign: 'left', fontWeight: 600, fontSize: '0.875rem', pb: '0.25rem' }}>
          {table.caption}
        </Box>
        <thead>
          <tr>
            {table.columns.map((column) => (
              <Box component="th" scope="col" key={column.head} sx={{ textAlign: alignOf(column) }}>
                {column.head}
                {column.unit !== undefined && column.unit !== '' && (
                  <Box component="span" sx={{ display: 'block', fontWeight: 400, color: 'var(--soft)' }}>
                    {column.unit}
                  </Box>
                )}
              </Box>
            ))}
          </tr>
        </thead>
        <tbody>
          {table.rows.slice(0, MOST_ROWS).map((row, index) => (
            // biome-ignore lint/suspicious/noArrayIndexKey: rows of a finished paper never move, and may be alike
            <tr key={index}>
              {table.columns.map((column, at) => (
                <Box component="td" key={column.head} sx={{ textAlign: alignOf(column), whiteSpace: wrapOf(column) }}>
                  <CellWords cell={row[at] ?? ''} />
                </Box>
              ))}
            </tr>
          ))}
        </tbody>
      </Box>
      {rest > 0 && <Box sx={{ color: 'var(--soft)', pt: '0.25rem' }}>and {rest} more rows on paper</Box>}
      {table.notes.map((note) => (
        <Box key={note} sx={{ fontSize: '0.8125rem', color: 'var(--soft)', pt: '0.25rem' }}>
          {note}
        </Box>
      ))}
    </Box>
  );
}

const TABLE = {
  borderCollapse: 'collapse',
  fontVariantNumeric: 'tabular-nums',
  '& th': {
    fontWeight: 600,
    verticalAlign: 'bottom',
    borderBottom: '1px solid var(--edge)',
    padding: '0.25rem 0.75rem 0.25rem 0',
  },
  '& td': {
    verticalAlign: 'top',
    borderBottom: '1px solid var(--hair)',
    padding: '0.25rem 0.75rem 0.25rem 0',
    maxWidth: '24rem',
  },
} as const;

function alignOf({ align }: Column): 'left' | 'right' {
  return align === 'left' ? 'left' : 'right';
}
function wrapOf({ kind }: Column): 'nowrap' | 'normal' {
  return kind === 'id' || kind === 'number' ? 'nowrap' : 'normal';
}

function CellWords({ cell }: { readonly cell: Cell }): ReactElement {
  if (typeof cell === 'string') return <>{cell}</>;
  return (
    <>
      {cell.mark === undefined ? cell.text : <SeverityMark severity={cell.mark} />}
      {cell.under !== undefined && cell.under !== '' && (
        <Box component="span" sx={{ display: 'block', color: 'var(--soft)' }}>
          {cell.under}
        </Box>
      )}
    </>
  );
}
