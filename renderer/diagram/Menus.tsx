/** The menus of the drawing, at the place where they were asked for. */
import Menu from '@mui/material/Menu';
import MenuItem from '@mui/material/MenuItem';
import Popover from '@mui/material/Popover';
import type { ReactElement } from 'react';
import type { JunctionId, PartId } from '../../core/api.ts';
import {
  detach,
  insertInto,
  joinJunctions,
  junctionsOf,
  parallelString,
  rawPart,
  setReference,
  terminalsOf,
} from '../../core/api.ts';
import { useOpenJob } from '../state/openJob.ts';
import { ConnectForm } from './ConnectForm.tsx';
import {
  copiedText,
  duplicateSelected,
  goToLedger,
  make,
  paste,
  putPart,
  removeSelected,
  selectAll,
  tidy,
} from './edits.ts';
import { JunctionChooser } from './JunctionChooser.tsx';
import { PaletteList } from './PaletteList.tsx';
import { useFit } from './useFit.ts';
import { type OpenMenu, useView } from './view.ts';

interface Choice {
  readonly words: string;
  readonly act: () => void;
}
type Menus<K extends OpenMenu['menu']> = Extract<OpenMenu, { menu: K }>;

const close = (): void => useView.setState({ menu: null });

export function DrawingMenus(): ReactElement | null {
  const menu = useView((view) => view.menu);
  if (menu === null) return null;
  switch (menu.menu) {
    case 'part':
      return <PartMenu menu={menu} />;
    case 'junction':
      return <Choices menu={menu} name={`Junction ${menu.junction}`} choices={junctionChoices(menu.junction, menu)} />;
    case 'ground':
      return <GroundMenu menu={menu} />;
    case 'connect':
      return (
        <Box menu={menu} name={`Connect ${menu.from} to ${menu.to}`}>
          <ConnectForm from={menu.from} to={menu.to} onDone={close} />
        </Box>
      );
    case 'choose-end':
      return (
        <Box menu={menu} name={`Connect ${menu.from} to`}>
          <JunctionChooser
            from={menu.from}
            onChoose={(to) => useView.setState({ menu: { menu: 'connect', from: menu.from, to, at: menu.at } })}
          />
        </Box>
      );
    case 'choose-start':
      return <StartMenu menu={menu} />;
    case 'new-part':
      return (
        <Box menu={menu} name={`A new part at ${menu.from}`}>
          <PaletteList
            focusFirst
            onPick={({ part }) => {
              close();
              putPart(part, menu.place, menu.from);
            }}
          />
        </Box>
      );
  }
}

function Choices({
  menu,
  name,
  choices,
}: {
  readonly menu: OpenMenu;
  readonly name: string;
  readonly choices: readonly Choice[];
}): ReactElement {
  return (
    <Menu
      open
      onClose={close}
      anchorReference="anchorPosition"
      anchorPosition={{ left: menu.at.x, top: menu.at.y }}
      slotProps={{ list: { 'aria-label': name, dense: true } }}
    >
      {choices.map(({ words, act }) => (
        <MenuItem
          key={words}
          onClick={() => {
            close();
            act();
          }}
        >
          {words}
        </MenuItem>
      ))}
    </Menu>
  );
}

function Box({
  menu,
  name,
  children,
}: {
  readonly menu: OpenMenu;
  readonly name: string;
  readonly children: ReactElement;
}): ReactElement {
  return (
    <Popover
      open
      onClose={close}
      anchorReference="anchorPosition"
      anchorPosition={{ left: menu.at.x, top: menu.at.y }}
      slotProps={{
        paper: { 'aria-label': name, role: 'dialog', sx: { width: '18rem', padding: '0.75rem', maxHeight: '28rem' } },
      }}
    >
      <div>
        <h2 style={{ margin: '0 0 0.5rem', fontSize: '1rem' }}>{name}</h2>
        {children}
      </div>
    </Popover>
  );
}

function PartMenu({ menu }: { readonly menu: Menus<'part'> }): ReactElement {
  const { job, draft, selection } = useOpenJob();
  const part = job.parts.find(({ id }) => id === menu.part);
  const many = selection.parts.length > 1;
  const count = many ? `${String(selection.parts.length)} parts` : menu.part;
  const raw = rawPart(draft, menu.part);
  const choices: readonly Choice[] = [
    ...(many ? [] : [{ words: 'Open in the ledger', act: goToLedger }]),
    { words: `Copy ${count}`, act: copySelected },
    { words: `Duplicate ${count}`, act: duplicateSelected },
    ...(many || part === undefined ? [] : conductorChoices(part.id, part.kind)),
    ...(many || part?.kind !== 'string'
      ? []
      : [{ words: 'Add a string like this one', act: () => void make(parallelString(menu.part)) }]),
    ...(many
      ? []
      : [
          {
            words: 'Connect from here …',
            act: () => useView.setState({ menu: { menu: 'choose-start', part: menu.part, at: menu.at } }),
          },
        ]),
    ...(many || raw === undefined
      ? []
      : terminalsOf(raw).map(({ path, junction }) => ({
          words: `Take ${path.replace('.', ' ')} off ${junction}`,
          act: () => void make(detach({ part: menu.part, terminal: path })),
        }))),
    { words: `Delete ${count}`, act: removeSelected },
  ];
  return <Choices menu={menu} name={`Part ${menu.part}`} choices={choices} />;
}

/** What can be put into a conductor: at the end that it comes from. */
function conductorChoices(id: PartId, kind: string): readonly Choice[] {
  if (kind !== 'cable' && kind !== 'pair') return [];
  const kinds = ['fuse', 'switch', 'joint'] as const;
  return kinds.map((each) => ({
    words: `Put a ${each} into it`,
    act: () => void make(insertInto({ cable: id, end: 'from', part: { kind: each } })),
  }));
}

function copySelected(): void {
  const text = copiedText();
  if (text === undefined) return;
  navigator.clipboard
    .writeText(text)
    .catch(() => useView.setState({ refusal: 'The clipboard is closed to this page: use Ctrl C on the drawing.' }));
}

function junctionChoices(junction: JunctionId, menu: OpenMenu): readonly Choice[] {
  const { job, selection } = useOpenJob.getState();
  const others = selection.junctions.filter((each) => each !== junction);
  const touching = job.parts.filter((part) => junctionsOf(part).includes(junction));
  return [
    {
      words: 'Connect from here …',
      act: () => useView.setState({ menu: { menu: 'choose-end', from: junction, at: menu.at } }),
    },
    { words: 'Make it 0 V', act: () => void make(setReference(junction)) },
    ...others.map((other) => ({
      words: `Make it one with ${other}`,
      act: () => void make(joinJunctions(junction, other)),
    })),
    {
      words: 'Select what meets here',
      act: () => useOpenJob.getState().select({ parts: touching.map(({ id }) => id), junctions: [junction] }),
    },
  ];
}

function GroundMenu({ menu }: { readonly menu: Menus<'ground'> }): ReactElement {
  const fitWhole = useFit();
  const pasteHere = (): void => {
    navigator.clipboard
      .readText()
      .then((text) => paste(text, menu.place))
      .catch(() => useView.setState({ refusal: 'The clipboard is closed to this page: use Ctrl V on the drawing.' }));
  };
  const choices: readonly Choice[] = [
    { words: 'Paste here', act: pasteHere },
    { words: 'Select everything', act: selectAll },
    { words: 'Tidy the drawing', act: tidy },
    { words: 'Fit it into view', act: () => fitWhole() },
  ];
  return <Choices menu={menu} name="Drawing" choices={choices} />;
}

/** From which of its junctions a part is to be connected. */
function StartMenu({ menu }: { readonly menu: Menus<'choose-start'> }): ReactElement {
  const raw = useOpenJob(({ draft }) => rawPart(draft, menu.part));
  const choices = (raw === undefined ? [] : terminalsOf(raw)).map(({ path, junction }) => ({
    words: `From ${path.replace('.', ' ')}, ${junction}`,
    act: () => useView.setState({ menu: { menu: 'choose-end', from: junction as JunctionId, at: menu.at } }),
  }));
  return <Choices menu={menu} name={`Connect ${menu.part} from`} choices={choices} />;
}
