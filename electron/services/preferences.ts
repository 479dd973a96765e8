/** How the person likes it: what may be chosen, and what holds until they choose. */
import type { Preferences } from '../../core/host.ts';

/** The first of each list is the default. */
export const preferenceChoices = {
  theme: ['system', 'light', 'dark'],
  paper: ['A4', 'Letter'],
  units: ['metric', 'us'],
  textPercent: [100, 125, 150, 200],
  motion: ['system', 'reduced'],
} as const satisfies { readonly [P in keyof Preferences]: readonly Preferences[P][] };

/** A value that is none of the choices, as a damaged or older store may hold it, counts as not chosen. */
export function preferencesFrom(stored: ReadonlyMap<string, unknown>): Preferences {
  const chosen = <P extends keyof Preferences>(name: P): Preferences[P] => {
    const choices = preferenceChoices[name] as readonly unknown[] as readonly Preferences[P][];
    return choices.find((choice) => choice === stored.get(name)) ?? choices[0]!;
  };
  return {
    theme: chosen('theme'),
    paper: chosen('paper'),
    units: chosen('units'),
    textPercent: chosen('textPercent'),
    motion: chosen('motion'),
  };
}
