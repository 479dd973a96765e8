/** What comes of reading what a person typed into a field of a screen. */

/** One answer to a question of a field; `text` is to be read in place of what was typed. */
export interface FieldChoice {
  /** As it stands on its button: `70 mm² of copper`. */
  readonly label: string;
  readonly text: string;
  /** The answer also says which way the length was meant. */
  readonly way?: Way;
}

/** A length along the run, or the wire out and back together. */
export type Way = 'one-way' | 'there-and-back';

export type FieldReading<Value> =
  | {
      readonly reading: 'value';
      readonly value: Value;
      /** What the job file keeps: as typed, with the unit that stood beside the field where the text had none. */
      readonly store: number | string;
      /** The same in other units, to stand in grey; empty where there is nothing to add. */
      readonly echo: string;
      /** What was done with the figure, to be shown with it: `24 ft there and back = 12 ft one way`. */
      readonly note?: string;
    }
  /** Nothing typed: the field is to be taken out of the job. */
  | { readonly reading: 'empty' }
  /** Not readable; one sentence for the person. */
  | { readonly reading: 'trouble'; readonly message: string }
  /** It means more than one thing. */
  | { readonly reading: 'ask'; readonly question: string; readonly choices: readonly FieldChoice[] };

/** A number and nothing else, as typed. */
export function isBareNumber(text: string): boolean {
  return /^[+\-−]?(?:\d+(?:\.\d*)?|\.\d+)(?:e[+-]?\d+)?$/i.test(text.trim());
}

/** A part of a sentence from a reader, as a sentence. */
export function sentence(part: string): string {
  const whole = part.charAt(0).toUpperCase() + part.slice(1);
  return /[.?!]$/.test(whole) ? whole : `${whole}.`;
}

/** The question that a comma between figures raises: a decimal point, or thousands. Undefined where there is no such comma. */
export function commaQuestion(text: string): Extract<FieldReading<never>, { reading: 'ask' }> | undefined {
  if (!/\d,\d/.test(text)) return undefined;
  const asPoint = text.replace(/(\d),(?=\d)/g, '$1.');
  const choices: FieldChoice[] = /\d\.\d+\.\d/.test(asPoint) ? [] : [{ label: asPoint, text: asPoint }];
  if (/(?<!\d)[1-9]\d{0,2}(?:,\d{3})+(?!\d)/.test(text)) {
    const asThousands = text.replace(/(\d),(?=\d{3})/g, '$1');
    choices.push({ label: asThousands, text: asThousands });
  }
  if (choices.length === 0) return undefined;
  return { reading: 'ask', question: 'A comma is not read here. Which did you mean?', choices };
}
