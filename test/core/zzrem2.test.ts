import { it } from 'vitest';
import { parseJob, remedyTrials, runChecks, draftOf } from '/work/main/core/api.ts';
import { examples } from '/work/main/data/examples/index.ts';
import { tables } from '/work/main/data/index.ts';
it('x', () => {
  for (const { name, text } of examples) {
    const d = draftOf(text); if (!d.ok) throw new Error('no');
    const { draft, job } = d.value;
    const t0 = (process.cpuUsage().user/1000);
    const report = runChecks({ job, tables });
    const t1 = (process.cpuUsage().user/1000);
    console.log('###', name, job.parts.length, 'parts', (t1 - t0).toFixed(1), 'ms check');
    for (const finding of report.findings) {
      const a = (process.cpuUsage().user/1000);
      const trials = remedyTrials({ draft, job, tables, finding, report });
      const b = (process.cpuUsage().user/1000);
      console.log(finding.severity, finding.rule, finding.parts.join(','), finding.case, (b - a).toFixed(0) + 'ms');
      for (const t of trials) console.log('    ', t.stillThere ? 'STILL' : 'gone', '|', t.label, '|', t.cost, '| gone', t.gone.map((f) => f.rule + ':' + f.parts[0]).join(' '), '| arisen', t.arisen.map((f) => f.severity+' '+f.rule + ':' + f.parts[0]).join(' '), '| unch', t.unchecked.length, t.after.measured?.value ?? '', t.after.limit.value);
    }
  }
});
