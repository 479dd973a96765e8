/** Reads a conductor size from a field; a number that means different copper to different people is asked about. */
import { type ConductorSize, parseSize, sizeText } from './conductorSize.ts';
import { commaQuestion, type FieldChoice, type FieldReading, sentence } from './fieldReading.ts';

/** `2/0`, `70mm2`, `250 kcmil`, `6 SAE`, `6 auto`. `70`, `6 mm` and `6 gauge` are asked about; only answers that exist are offered. */
export function readSizeField(text: string): FieldReading<ConductorSize> {
  const typed = text.trim();
  if (typed === '') return { reading: 'empty' };
  const comma = commaQuestion(typed);
  if (comma !== undefined) return comma;
  const read = parseSize(typed);
  if (read.ok) return { reading: 'value', value: read.value, store: typed, echo: '' };
  const choices = meanings(typed);
  if (choices.length === 0) return { reading: 'trouble', message: sentence(read.message) };
  return { reading: 'ask', question: `${typed}: which kind of size?`, choices };
}

const systems = {
  mm2: { word: 'mm2', meaning: 'of copper' },
  awg: { word: 'AWG', meaning: '' },
  sae: { word: 'SAE', meaning: 'a little less copper than AWG' },
  auto: { word: 'auto', meaning: 'over the insulation' },
} as const;

function meanings(typed: string): readonly FieldChoice[] {
  const number = /^#?([\d./]+)\s*(.*)$/.exec(typed);
  if (number === null) return [];
  const [, figure = '', word = ''] = number;
  const asked = askedSystems(word.toLowerCase());
  return asked.flatMap((system) => {
    const text = `${figure} ${systems[system].word}`;
    const read = parseSize(text);
    if (!read.ok) return [];
    const { meaning } = systems[system];
    return [{ label: meaning === '' ? sizeText(read.value) : `${sizeText(read.value)}, ${meaning}`, text }];
  });
}

function askedSystems(word: string): readonly (keyof typeof systems)[] {
  if (word === '') return ['mm2', 'awg', 'sae', 'auto'];
  if (/^(?:mm|millimet(?:re|er)s?)$/.test(word)) return ['mm2', 'auto'];
  return /^(?:ga|g|gauge)\.?$/.test(word) ? ['awg', 'sae'] : [];
}
