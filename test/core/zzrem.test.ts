import { it } from 'vitest';
import { runChecks, draftOf, operatingPoint, checkRules, applyEdit, setField } from '../../core/api.ts';
import { CheckContext } from '../../core/checks/checkContext.ts';
import { examples } from '../../data/examples/index.ts';
import { tables } from '../../data/index.ts';
it('x', () => {
  const { text } = examples.find((e) => e.name === 'sloop-with-seeded-trouble')!;
  const d = draftOf(text); if (!d.ok) throw new Error('no');
  const { draft, job } = d.value;
  const time = (name: string, f: () => void, n = 5) => { f(); const all: number[] = []; for (let k = 0; k < n; k++) { const a = performance.now(); f(); all.push(performance.now() - a);} all.sort((a,b)=>a-b); console.log(name, all[Math.floor(n/2)]!.toFixed(2)); };
  time('runChecks', () => runChecks({ job, tables }));
  const fresh = () => { const e = applyEdit(draft, setField({ part: 'F-INV', field: 'ratingA', value: 110 }), tables); if (!e.ok) throw new Error('x'); return e.value.job; };
  time('applyEdit', () => fresh());
  time('runChecks fresh', () => runChecks({ job: fresh(), tables }));
  time('context', () => new CheckContext({ job, tables }));
  time('context fresh', () => new CheckContext({ job: fresh(), tables }));
  const one = job.cases[0]!;
  time('one solve', () => operatingPoint({ job, operatingCase: one, tables, model: 'slow' }));
  console.log('cases', job.cases.length);
  for (const rule of checkRules) { time(rule.id, () => { const c = new CheckContext({ job, tables }); const a = performance.now(); rule.run(c); }); }
});
