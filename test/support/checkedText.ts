/** What `quietrun check - --format json` answers for a text: the way that every outsider takes to a number. */
import assert from 'node:assert/strict';
import { tmpdir } from 'node:os';
import { run } from '../../server/src/cli/run';
import { checkSchema, type CheckReport } from '../../server/src/cli/checkSchema';

export type FileReport = CheckReport['files'][number];
export type RunReport = FileReport['runs'][number];
export type CouplingReport = RunReport['couplings'][number];
export type BudgetReport = FileReport['budgets'][number];

export interface CheckedText {
  readonly status: number;
  readonly report: CheckReport;
  readonly file: FileReport;
  readonly raw: string;
}

export async function checkedText(text: string, options: readonly string[] = []): Promise<CheckedText> {
  let raw = '';
  let complaints = '';
  const status = await run(['check', '-', '--format', 'json', ...options], {
    workingDirectory: tmpdir(),
    version: '0.0.0',
    coloured: false,
    write: (more) => { raw += more; },
    complain: (more) => { complaints += more; },
    readStandardInput: async () => new TextEncoder().encode(text),
    serve: async () => assert.fail('check does not serve'),
  });
  assert.equal(complaints, '');
  const report = checkSchema.parse(JSON.parse(raw));
  return { status, report, file: report.files[0]!, raw };
}

/** The one run of a text, which must be free of errors other than those of budgets. */
export async function checkedRun(text: string, name = 'r'): Promise<RunReport> {
  const { file } = await checkedText(text);
  const faults = file.findings.filter(({ rule, severity }) => severity === 'error' && rule !== 'over-budget');
  assert.deepEqual(faults.map(({ rule, message }) => `${rule}: ${message}`), [], text);
  const found = file.runs.find((run_) => run_.name === name);
  assert.ok(found, `no run ${name} in the answer to\n${text}`);
  return found;
}

export async function checkedCoupling(text: string, aggressor = 'A', victim = 'V', edge = 'rise', name = 'r'): Promise<CouplingReport> {
  const { couplings } = await checkedRun(text, name);
  const found = couplings.find((each) => each.aggressor === aggressor && each.victim === victim && each.edge === edge);
  assert.ok(found, `no coupling from ${aggressor} into ${victim} at the ${edge} in ${JSON.stringify(couplings.map((each) => [each.aggressor, each.victim, each.edge]))}`);
  return found;
}

export async function checkedBudget(text: string, net = 'V'): Promise<BudgetReport> {
  const { file } = await checkedText(text);
  const found = file.budgets.find((each) => each.net === net);
  assert.ok(found, `no budget of ${net} in the answer to\n${text}`);
  return found;
}
