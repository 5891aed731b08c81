/**
 * What a check found, as the XML that test reports are written in: a suite for each file, a case for its text, each budget, each
 * run and each loop with a limit. A case of which something fails the check has failed; what is waived is skipped, with the reason.
 */
import type { Budget } from '../budget/results';
import type { Finding } from '../rules/rule';
import { isRuleName, isWaivable } from '../rules/ruleNames';
import { inText } from '../units/inText';
import type { CheckedFile } from './checkedFiles';
import { linesOf } from './positions';

export function junitOutput(checked: readonly CheckedFile[], failOn: 'error' | 'warning'): string {
  const suites = checked.map((file) => suiteOf(file, failOn));
  return `<?xml version="1.0" encoding="UTF-8"?>\n${element('testsuites', { name: 'quietrun', ...counts(suites.flatMap(({ cases }) => cases)) }, suites.map(({ xml }) => xml))}\n`;
}

/** What the case is of, and what was found of it. */
interface Case {
  readonly name: string;
  readonly findings: readonly Finding[];
  /** Of a case that neither passes nor fails. */
  readonly skipped?: string;
}

interface JudgedCase {
  readonly outcome: 'passed' | 'failed' | 'error' | 'skipped';
  readonly xml: string;
}

interface Suite {
  readonly cases: readonly JudgedCase[];
  readonly xml: string;
}

function suiteOf(file: CheckedFile, failOn: 'error' | 'warning'): Suite {
  const cases = casesOf(file).map((each) => judged(each, file, failOn));
  return { cases, xml: element('testsuite', { name: file.path, ...counts(cases) }, cases.map(({ xml }) => xml)) };
}

const isOfText = ({ rule }: Finding) => isRuleName(rule) && !isWaivable(rule);

/** Each finding stands in one case. */
function casesOf({ analysis: { project, evaluation, findings } }: CheckedFile): readonly Case[] {
  const left = new Set(findings);
  const take = (wanted: (finding: Finding) => boolean) => {
    const taken = [...left].filter(wanted);
    for (const finding of taken) left.delete(finding);
    return taken;
  };
  const of = (kinds: readonly string[], name: string) => take(({ subject }) => subject !== null && kinds.includes(subject.kind) && subject.name === name);
  const cases: Case[] = [{ name: 'the text', findings: take(isOfText) }];
  for (const budget of evaluation.budgets) {
    const findingsOfBudget = take((finding) => finding.rule !== 'dominant-coupling' && isOf(budget, finding));
    cases.push({ name: nameOf(budget), findings: [...findingsOfBudget, ...take(({ fault, subject }) => !('budget' in fault) && subject?.name === budget.subject.name && subject.kind === budget.subject.kind)], ...(budget.verdict === 'unknown' ? { skipped: 'The budget is incomplete: it has no margin.' } : {}) });
  }
  for (const { run } of evaluation.runs) cases.push({ name: `run ${run.name}`, findings: of(['run'], run.name) });
  for (const loop of project.loops) {
    if (loop.areaLimit !== null || loop.inductanceLimit !== null || 0 < evaluation.loops.filter((each) => each.loop === loop && 0 < each.emission.length).length) cases.push({ name: `loop ${loop.name}`, findings: of(['loop'], loop.name) });
  }
  for (const finding of left) cases.push({ name: finding.subject === null ? finding.rule : `${finding.subject.kind} ${finding.subject.name}: ${finding.rule}`, findings: [finding] });
  return cases;
}

/** One net may have several budgets; what is found of a budget says of which. */
const isOf = (budget: Budget, { fault }: Finding) => 'budget' in fault && fault.budget === budget;

const kindInWords = { net: '', pair: ' as difference', common: ' as mean' } as const;

const nameOf = ({ subject, kind, tolerates, measure }: Budget) => `${subject.name} within ${inText(tolerates, 'voltage')} ${measure}${kindInWords[kind]}`;

function judged({ name, findings, skipped }: Case, file: CheckedFile, failOn: 'error' | 'warning'): JudgedCase {
  const isHidden = (finding: Finding) => finding.waived !== null || file.known.has(finding);
  const fails = ({ severity }: Finding) => severity === 'error' || (failOn === 'warning' && severity === 'warning');
  const failing = findings.filter((finding) => !isHidden(finding) && fails(finding));
  const hidden = findings.filter((finding) => isHidden(finding) && fails(finding));
  const rest = findings.filter((finding) => !failing.includes(finding) && !hidden.includes(finding));
  const reasons = [...hidden.map(({ waived }) => waived ?? 'It is in the baseline.'), ...(skipped === undefined ? [] : [skipped])];
  const outcome = 0 < failing.length ? (failing.every(isOfText) ? 'error' : 'failed') : 0 < reasons.length ? 'skipped' : 'passed';
  const words = (shown: readonly Finding[]) => shown.map((finding) => saidOf(finding, file)).join('\n');
  const parts = [
    ...(outcome === 'error' || outcome === 'failed' ? [element(outcome === 'error' ? 'error' : 'failure', { type: failing[0].rule, message: failing[0].message }, [escaped(words(failing))])] : []),
    ...(outcome === 'skipped' ? [element('skipped', { message: reasons.join(' ') }, [])] : []),
    ...(rest.length === 0 && hidden.length === 0 ? [] : [element('system-out', {}, [escaped(words([...hidden, ...rest]))])]),
  ];
  return { outcome, xml: element('testcase', { name, classname: file.path }, parts) };
}

function saidOf({ at, rule, severity, message, waived }: Finding, { text }: CheckedFile): string {
  const { line, character } = linesOf(text(at.path)).at(at.span.start);
  return `${at.path}:${line + 1}:${character + 1} ${waived === null ? severity : 'waived'}[${rule}]: ${message}`;
}

function counts(cases: readonly JudgedCase[]): Record<string, number> {
  const of = (wanted: JudgedCase['outcome']) => cases.filter(({ outcome }) => outcome === wanted).length;
  return { tests: cases.length, failures: of('failed'), errors: of('error'), skipped: of('skipped') };
}

/** `content` is XML already. */
function element(name: string, attributes: Readonly<Record<string, string | number>>, content: readonly string[]): string {
  const head = `${name}${Object.entries(attributes).map(([key, value]) => ` ${key}="${escaped(String(value)).replace(/[\n\t]/g, ' ')}"`).join('')}`;
  const isText = content.length === 1 && !content[0].startsWith('<');
  if (content.length === 0) return `<${head}/>`;
  return isText ? `<${head}>${content[0]}</${name}>` : `<${head}>\n${content.join('\n').replace(/^(?= *<)/gm, '  ')}\n</${name}>`;
}

/** XML 1.0, section 2.2: what may stand in a document at all. */
const forbidden = /[^\t\n\r\u0020-\ud7ff\ue000-\ufffd\u{10000}-\u{10ffff}]/gu;

function escaped(text: string): string {
  return text.replace(/\r\n?/g, '\n').replace(forbidden, '\ufffd').replace(/&/g, '&amp;').replace(/</g, '&lt;').replace(/>/g, '&gt;').replace(/"/g, '&quot;');
}
