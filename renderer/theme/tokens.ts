/**
 * The colours of the drawing board, as CSS custom properties. Paper and ink by day, blue-black and chalk by night; copper for conductors
 * and the first action, a cool blue for potentials. Contrast on the ground: text at least 4.5 to 1, graphics at least 3 to 1
 * (tested). Chosen apart in lightness too, so that they read in grey and with a colour-vision deficiency.
 */
export interface Tokens {
  /** Ground of the page. */
  readonly ground: string;
  /** Sheets that lie on it: ledger, menus, fields. */
  readonly sheet: string;
  readonly ink: string;
  /** Second-line text. */
  readonly soft: string;
  /** Hairlines that only divide. */
  readonly hair: string;
  /** Edges of fields and other things that must be seen. */
  readonly edge: string;
  readonly copper: string;
  /** Text on copper. */
  readonly onCopper: string;
  /** Potentials: volts. */
  readonly volt: string;
  /** Ground of what is selected or lit. */
  readonly lit: string;
  readonly stop: string;
  readonly fix: string;
  readonly look: string;
  readonly note: string;
}

export const day: Tokens = {
  ground: '#f7f3ea',
  sheet: '#fffdf8',
  ink: '#1c2530',
  soft: '#55606d',
  hair: '#ddd4c3',
  edge: '#857b69',
  copper: '#96450f',
  onCopper: '#ffffff',
  volt: '#1b5a88',
  lit: '#f6e3cf',
  stop: '#a3122b',
  fix: '#8a4b00',
  look: '#255e7e',
  note: '#55606d',
};

export const night: Tokens = {
  ground: '#0e1622',
  sheet: '#152030',
  ink: '#ece8de',
  soft: '#a9b3bf',
  hair: '#2b3a4d',
  edge: '#74879c',
  copper: '#eda66f',
  onCopper: '#1b0f05',
  volt: '#86c5ee',
  lit: '#3a2c20',
  stop: '#ff8f9b',
  fix: '#f2b65c',
  look: '#8cc7e6',
  note: '#a9b3bf',
};

/** `--ink: #1c2530; …` for the root of the page; used everywhere as `var(--ink)`. */
export function customProperties(tokens: Tokens): Readonly<Record<string, string>> {
  return Object.fromEntries(Object.entries(tokens).map(([name, colour]) => [`--${name}`, String(colour)]));
}
