/** The right control for any field of any part, by the rules of the job file; each change is one edit. */
import type { ReactElement } from 'react';
import {
  type Field,
  type FieldUnit,
  factor,
  firstText,
  formatQuantity,
  milliohm,
  type Origin,
  originOf,
  type Part,
  type PartFigure,
  type PartId,
  partFields,
  type RawPart,
  rawPart,
  setField,
  setInCase,
  setOrigin,
  type UnitsFirst,
} from '../../core/api.ts';
import { useOpenJob } from '../state/openJob.ts';
import { usePreferences } from '../state/preferences.ts';
import { LinkButton } from './AskRow.tsx';
import { ChoiceField } from './ChoiceField.tsx';
import { CountField } from './CountField.tsx';
import { CurveField } from './CurveField.tsx';
import { FlagField } from './FlagField.tsx';
import { figuresOf } from './figuresOf.ts';
import { LengthField } from './LengthField.tsx';
import { OriginMark } from './OriginMark.tsx';
import { PointsField } from './PointsField.tsx';
import { QuantityField } from './QuantityField.tsx';
import { RangeFields } from './RangeFields.tsx';
import { SizeField } from './SizeField.tsx';
import { TextField } from './TextField.tsx';
import type { FieldProps } from './TypedField.tsx';
import { type Taken, takeEdit } from './taken.ts';
import { choiceWord, fieldHint, fieldWord, flagWords } from './words.ts';

export interface PartFieldProps {
  readonly partId: PartId;
  /** As the job file names it. */
  readonly field: string;
  readonly label?: string;
  /** Without the mark of origin. */
  readonly plain?: boolean;
  /** The change is made in this case only; else on the drawing. */
  readonly inCase?: string | undefined;
}

/** The fields that every part has beside those of its kind. */
const common: Readonly<Record<string, Field>> = {
  label: { rule: { holds: 'text', longest: 200 } },
  note: { rule: { holds: 'text', longest: 10_000 } },
  locationTag: { rule: { holds: 'text', longest: 200 } },
  enclosure: { rule: { holds: 'text', longest: 200 } },
};

export function PartField(props: PartFieldProps): ReactElement | null {
  const { partId: id, field } = props;
  const raw = useOpenJob((open) => rawPart(open.draft, id));
  const part = useOpenJob((open) => open.job.parts.find((one) => one.id === id));
  const figure = useOpenJob((open) => figuresOf(open.answers, open.caseId, id).get(field));
  const set = useOpenJob((open) =>
    props.inCase === undefined ? undefined : setValue(open.draft, props.inCase, id, field),
  );
  if (raw === undefined || part === undefined) return null;
  const rule = partFields.get(part.kind)?.[field] ?? common[field];
  if (rule === undefined) return null;
  return (
    <Control
      {...props}
      key={`${id} ${field} ${props.inCase ?? ''}`}
      raw={raw}
      drawn={part}
      rule={rule}
      figure={figure}
      set={set}
    />
  );
}

/** What a case sets for a field, as the draft has it. */
function setValue(draft: object, caseId: string, part: string, field: string): unknown {
  const cases =
    (draft as { cases?: readonly { id: string; set?: Record<string, Record<string, unknown>> }[] }).cases ?? [];
  return cases.find(({ id }) => id === caseId)?.set?.[part]?.[field];
}

interface ControlProps extends PartFieldProps {
  readonly raw: RawPart;
  readonly drawn: Part;
  readonly rule: Field;
  readonly figure: PartFigure | undefined;
  readonly set: unknown;
}

function Control(props: ControlProps): ReactElement | null {
  const { field, raw, drawn, rule, figure, set, inCase, partId } = props;
  const practice = useOpenJob((open) => open.job.practice);
  const first = usePreferences((preferences) => preferences.units);
  const given = set ?? raw[field];
  const commit = (value: unknown): Taken => takeEdit(editOf(props, value));
  const assumed = assumedText({ rule, figure, field, first });
  const name = props.label ?? fieldWord(field);
  const hint = fieldHint(field);
  const common: FieldProps = {
    label: name,
    ...(hint === undefined ? {} : { hint }),
    ...(given === undefined && assumed !== undefined ? { assumed } : {}),
    ...(rule.required === true && inCase === undefined ? { required: true } : {}),
    focusKey: `${partId}.${field}`,
    ...(props.plain === true || !hasOrigin(rule) ? {} : { mark: <Mark {...props} name={name} /> }),
    ...notes(props, first),
  };
  const figureGiven = given as number | string | undefined;
  switch (rule.rule.holds) {
    case 'quantity':
      if (rule.rule.unit === 'm') {
        const isRun = drawn.kind === 'pair' && field === 'lengthM';
        return <LengthField {...common} given={figureGiven} onCommit={commit} {...(isRun ? { way: 'one-way' } : {})} />;
      }
      return (
        <QuantityField
          {...common}
          unit={rule.rule.unit}
          {...bareOf(drawn, rule)}
          given={figureGiven}
          onCommit={commit}
        />
      );
    case 'count':
      return <CountField {...common} value={figureGiven as number | undefined} onCommit={commit} />;
    case 'choice':
      return (
        <ChoiceField
          {...common}
          value={given as string | undefined}
          of={rule.rule.of}
          words={(choice) => choiceWord(field, choice)}
          onCommit={commit}
        />
      );
    case 'flag':
      return <FlagField {...common} value={given as boolean | undefined} {...flagWords(field)} onCommit={commit} />;
    case 'size': {
      const make = 'metal' in drawn ? { metal: drawn.metal, stranding: drawn.stranding } : noMake;
      return (
        <SizeField {...common} given={given as string | undefined} make={make} practice={practice} onCommit={commit} />
      );
    }
    case 'efficiency':
      return <PointsField {...common} given={given} onCommit={commit} />;
    case 'curve':
      return <CurveField {...common} given={given} onCommit={commit} />;
    case 'text':
      return (
        <TextField
          {...common}
          value={given as string | undefined}
          {...(field === 'note' ? { rows: 2 } : {})}
          onCommit={commit}
        />
      );
    case 'junction':
      return <TextField {...common} value={given as string | undefined} onCommit={commit} />;
    default:
      return null;
  }
}

const noMake = { metal: undefined, stranding: undefined } as const;

function editOf({ partId: part, field, inCase, drawn }: ControlProps, value: unknown) {
  if (inCase !== undefined) return setInCase({ case: inCase, part, field, value });
  // A figure that was measured is taken to be measured again; what was assumed or guessed no longer is.
  const isMeasured = value !== undefined && drawn.origin.get(field) === 'measured';
  return setField({ part, field, value, ...(isMeasured ? { origin: 'measured' as const } : {}) });
}

function hasOrigin({ rule }: Field): boolean {
  return ['quantity', 'count', 'size', 'efficiency', 'curve'].includes(rule.holds);
}

/** Wiring is spoken of in milliohms; a share that may exceed 1 is a factor. */
function bareOf(part: Part, { rule }: Field): { readonly bare?: FieldUnit } {
  if (rule.holds !== 'quantity') return {};
  if (rule.unit === 'ohm' && part.kind !== 'load') return { bare: milliohm };
  return rule.unit === '1' && (rule.atMost ?? 1) > 1 ? { bare: factor } : {};
}

/** What is taken where nothing is given, in words; undefined where nothing is. */
function assumedText(request: {
  readonly rule: Field;
  readonly figure: PartFigure | undefined;
  readonly field: string;
  readonly first: UnitsFirst;
}): string | undefined {
  const { rule, figure, field, first } = request;
  const value = figure?.value ?? rule.standard;
  if (value === undefined || value === null) return undefined;
  return valueText({ value, field, rule, first });
}

function valueText({
  value,
  field,
  rule: { rule },
  first,
}: {
  readonly value: number | string | boolean;
  readonly field: string;
  readonly rule: Field;
  readonly first: UnitsFirst;
}): string {
  if (typeof value === 'boolean') return value ? flagWords(field).yes : flagWords(field).no;
  if (typeof value === 'string') return rule.holds === 'choice' ? choiceWord(field, value) : value;
  if (rule.holds === 'quantity') return firstText({ value, unit: rule.unit, first });
  return rule.holds === 'efficiency' ? formatQuantity({ value, unit: '1' }) : String(value);
}

/** Said under a field: the range of its figure, and what the chosen case makes of it. */
function notes(props: ControlProps, first: UnitsFirst): { readonly below?: ReactElement } {
  const range = rangeNote(props, first);
  const inCase = <CaseNote {...props} first={first} />;
  const isChanged = props.inCase === undefined ? props.figure?.changedInCase === true : props.set !== undefined;
  if (range === '' && !isChanged) return {};
  return {
    below: (
      <>
        {range !== '' && <span>{`${range} `}</span>}
        {isChanged && inCase}
      </>
    ),
  };
}

function rangeOf({ raw, field, drawn, figure }: ControlProps): readonly [number, number] | undefined {
  return raw[field] === undefined ? (figure?.range ?? undefined) : drawn.range.get(field);
}

function rangeNote(props: ControlProps, first: UnitsFirst): string {
  const range = rangeOf(props);
  const { rule } = props.rule;
  if (range === undefined || rule.holds !== 'quantity') return '';
  const [low, high] = range.map((value) => firstText({ value, unit: rule.unit, first, digits: 3 }));
  return `Between ${low ?? ''} and ${high ?? ''}.`;
}

function CaseNote(props: ControlProps & { readonly first: UnitsFirst }): ReactElement | null {
  const { figure, field, rule, inCase, partId: part, first } = props;
  if (inCase === undefined) {
    if (figure === undefined || figure.value === null) return null;
    return <span>{`This case sets ${valueText({ value: figure.value, field, rule, first })}.`}</span>;
  }
  return (
    <span>
      {'Set in this case. '}
      <LinkButton type="button" onClick={() => takeEdit(setInCase({ case: inCase, part, field, value: undefined }))}>
        As drawn
      </LinkButton>
    </span>
  );
}

function Mark(props: ControlProps & { readonly name: string }): ReactElement {
  const { partId: part, field, raw, drawn, figure, rule, name } = props;
  const isGiven = raw[field] !== undefined;
  const origin: Origin = isGiven ? originOf(drawn, field) : (figure?.origin ?? 'default');
  const unit = rule.rule.holds === 'quantity' ? rule.rule.unit : undefined;
  if (!isGiven)
    return figure?.value === null && rule.standard === undefined ? <span /> : <OriginMark origin={origin} />;
  return (
    <OriginMark
      origin={origin}
      of={name}
      onChange={(chosen) => takeEdit(setOrigin({ part, field, origin: chosen }))}
      more={
        unit === undefined ? null : (
          <RangeFields
            part={part}
            field={field}
            unit={unit}
            bare={bareOf(drawn, rule).bare}
            range={drawn.range.get(field)}
          />
        )
      }
    />
  );
}
