/**
 * The acceptance scenarios: their inputs and expected values, and a tally of which values a test has held.
 *
 * A solve answers S01, S03, S05, S17, S19 and most of S07 and S11; the study of strings S01, S03, S13, S17, S19. Left to the tests of
 * other capabilities: S09 (sizing a cable), S15 (a winter's energy).
 */
import { expect, it } from 'vitest';
import bookText from './data/scenarios.json?raw';

interface Expected {
  readonly name: string;
  readonly value: number | boolean;
  readonly unit: string;
  readonly tol?: number;
}
interface Scenario {
  readonly id: string;
  readonly inputs: unknown;
  readonly expected: readonly Expected[];
}

interface Book {
  readonly convention: { readonly rho20_ohm_mm2_per_m: number };
  readonly scenarios: readonly Scenario[];
}
const book = JSON.parse(bookText) as Book;
const { scenarios } = book;

/** The scenarios' own convention for a conductor: copper at 20 °C by its plain area. */
export function plainCopperOhm(run: { readonly lengthM: number; readonly areaMm2: number }): number {
  return (book.convention.rho20_ohm_mm2_per_m * run.lengthM) / run.areaMm2;
}

/** The scenarios' own convention for a joint, 0.1 mΩ unless stated. */
export const lugOhm = 0.0001;

/** One scenario's expected values; `hold` compares a figure with the book's value within the book's own tolerance. */
export class ScenarioPage {
  readonly id: string;
  private readonly expected: readonly Expected[];
  private readonly held = new Set<string>();

  constructor(id: string) {
    const scenario = scenarios.find((candidate) => candidate.id === id);
    if (scenario === undefined) throw new Error(`there is no scenario ${id}`);
    this.id = id;
    this.expected = scenario.expected;
  }

  hold(name: string, figure: number): void {
    const { value, tol } = this.rowOf(name);
    if (typeof value !== 'number' || tol === undefined) throw new Error(`${name} is no figure with a tolerance`);
    this.held.add(name);
    if (Math.abs(figure - value) <= tol) return;
    throw new Error(`${this.id}, ${name}: got ${figure}, the book says ${value} within ${tol}`);
  }

  /** Holds a verdict, or a round figure that the book gives without a tolerance. */
  holdVerdict(name: string, verdict: boolean | number): void {
    const { value } = this.rowOf(name);
    this.held.add(name);
    if (verdict !== value) throw new Error(`${this.id}, ${name}: got ${verdict}, the book says ${value}`);
  }

  /** Names of the values that no test has held so far. */
  left(): readonly string[] {
    return this.expected.map(({ name }) => name).filter((name) => !this.held.has(name));
  }

  private rowOf(name: string): Expected {
    const row = this.expected.find((candidate) => candidate.name === name);
    if (row === undefined) throw new Error(`scenario ${this.id} has no value named ${name}`);
    return row;
  }
}

/** A scenario's own inputs, as they stand in the book. */
export function inputsOf(id: string): unknown {
  return scenarios.find((scenario) => scenario.id === id)?.inputs;
}

/** A last test of a scenario: fails when a value was neither held nor named as another capability's answer. */
export function closePage(page: ScenarioPage, notASolve: readonly string[] = []): void {
  it("every value of the scenario is held above or named as not a solve's", () => {
    expect(page.left()).toStrictEqual(notASolve);
  });
}
