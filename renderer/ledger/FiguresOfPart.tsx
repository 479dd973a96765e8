/** The fields of a part: those that say something first, the others folded. */
import type { ReactElement } from 'react';
import { type Field, type Part, partFields } from '../../core/api.ts';
import { Folded } from '../controls/Folded.tsx';
import { figuresOf } from '../controls/figuresOf.ts';
import { PartField } from '../controls/PartField.tsx';
import { useOpenJob } from '../state/openJob.ts';

/** What a person looks for first, beside the figures that every part of its kind must have. */
const leading = ['size', 'minusSize', 'minusLengthM', 'powerW', 'currentA'];
const touching = ['junction', 'poles', 'junction-list', 'point', 'anything'];

export function FiguresOfPart({
  part,
  inCase,
}: {
  readonly part: Part;
  readonly inCase: string | undefined;
}): ReactElement {
  const figures = useOpenJob((open) => figuresOf(open.answers, open.caseId, part.id));
  const fields = Object.entries(partFields.get(part.kind) ?? {}).filter(
    ([, { rule }]) => !touching.includes(rule.holds),
  );
  const isTold = ([name, field]: [string, Field]): boolean =>
    field.required === true ||
    part.given.has(name) ||
    figures.get(name)?.from === 'assumed' ||
    figures.get(name)?.changedInCase === true ||
    (field.rule.holds === 'flag' && field.standard !== undefined);
  const leads = ([name, field]: [string, Field]): boolean => field.required === true || leading.includes(name);
  const inRuleOrder = fields.filter(isTold);
  const told = [...inRuleOrder.filter(leads), ...inRuleOrder.filter((field) => !leads(field))];
  const others = fields.filter((field) => !isTold(field));
  const control = ([name]: [string, Field]): ReactElement => (
    <PartField key={name} partId={part.id} field={name} inCase={inCase} />
  );
  return (
    <>
      {told.map(control)}
      {others.length > 0 && (
        <Folded title="More figures" aside={`${String(others.length)} not given`}>
          {others.map(control)}
        </Folded>
      )}
    </>
  );
}
