/**
 * What a check found, as SARIF 2.1.0 (OASIS, Static Analysis Results Interchange Format). The fingerprint is the baseline key, so
 * that a service that shows the results follows a finding through edits as a baseline does.
 */
import type { Place } from '../board/model';
import type { Fix } from '../fixes/fix';
import { rules } from '../rules/index';
import type { Finding, Rule, Severity } from '../rules/rule';
import { rulePage } from '../rules/rulePage';
import type { CheckedFile } from './checkedFiles';
import { linesOf, type Lines } from './positions';

const levels: Record<Severity, 'error' | 'warning' | 'note'> = { error: 'error', warning: 'warning', information: 'note', hint: 'note' };

export function sarifOutput(checked: readonly CheckedFile[], version: string): string {
  const log = {
    $schema: 'https://docs.oasis-open.org/sarif/sarif/v2.1.0/errata01/os/schemas/sarif-schema-2.1.0.json',
    version: '2.1.0',
    runs: [{
      tool: { driver: { name: 'quietrun', semanticVersion: version, rules: rules.map(ruleDescriptor) } },
      columnKind: 'utf16CodeUnits',
      originalUriBaseIds: { [baseId]: { description: { text: 'The working directory of the check.' } } },
      invocations: [{ executionSuccessful: true }],
      results: checked.flatMap(resultsOf),
    }],
  };
  return `${JSON.stringify(log, null, 2)}\n`;
}

const baseId = 'WORKING_DIRECTORY';

function ruleDescriptor(rule: Rule) {
  const { name, severity, documentation: { finds, matters } } = rule;
  return { id: name, shortDescription: { text: finds }, fullDescription: { text: matters }, help: { text: `${finds} ${matters}`, markdown: rulePage(rule) }, defaultConfiguration: { level: levels[severity] } };
}

/** Most fixes are solved for: a report of a board where all is wrong must not take all night. */
const mostMended = 50;

const indexOf = new Map<string, number>(rules.map(({ name }, index) => [name, index]));

function resultsOf(file: CheckedFile) {
  const physical = locationsIn(file);
  const mended = new Set(file.analysis.findings.filter(({ severity }) => severity === 'error' || severity === 'warning').slice(0, mostMended));
  return file.analysis.findings.map((finding) => {
    const { rule, severity, message, at, subject, related, key, value, limit, unit } = finding;
    const index = indexOf.get(rule);
    return {
      ruleId: rule,
      ...(index === undefined ? {} : { ruleIndex: index }),
      level: levels[severity],
      message: { text: message },
      locations: [{ physicalLocation: physical(at), ...(subject === null ? {} : { logicalLocations: [{ name: subject.name, kind: subject.kind }] }) }],
      ...(related.length === 0 ? {} : { relatedLocations: related.map((each, id) => ({ id, physicalLocation: physical(each.place), message: { text: each.message } })) }),
      partialFingerprints: { 'quietrunKey/v1': `${file.path} ${key}` },
      suppressions: suppressionsOf(finding, file),
      ...(mended.has(finding) ? fixesOf(finding, file, physical) : {}),
      ...(value === null && limit === null ? {} : { properties: { value: finite(value), limit: finite(limit), unit } }),
    };
  });
}

function suppressionsOf(finding: Finding, { known }: CheckedFile) {
  if (finding.waived !== null) return [{ kind: 'inSource', justification: finding.waived }];
  return known.has(finding) ? [{ kind: 'external', justification: 'It is in the baseline.' }] : [];
}

type Physical = (place: Place) => ReturnType<ReturnType<typeof locationsIn>>;

function locationsIn({ text }: CheckedFile) {
  const known = new Map<string, Lines>();
  return ({ path, span }: Place) => {
    const lines = known.get(path) ?? linesOf(text(path));
    known.set(path, lines);
    const { start, end } = lines.range(span);
    return { artifactLocation: artifactAt(path), region: { startLine: start.line + 1, startColumn: start.character + 1, endLine: end.line + 1, endColumn: end.character + 1 } };
  };
}

/** A path on another drive has no way from the working directory. */
function artifactAt(path: string) {
  const isAbsolute = /^(\/|[A-Za-z]:)/.test(path);
  const encoded = path.split('/').map((part, at) => (isAbsolute && at === 0 ? part : encodeURIComponent(wellFormed(part)))).join('/');
  return isAbsolute ? { uri: `file://${encoded.startsWith('/') ? '' : '/'}${encoded}` } : { uri: encoded, uriBaseId: baseId };
}

/** Half of a surrogate pair has no encoding. */
const wellFormed = (text: string) => text.replace(/[\ud800-\udbff](?![\udc00-\udfff])|(?<![\ud800-\udbff])[\udc00-\udfff]/g, '\ufffd');

function fixesOf(finding: Finding, file: CheckedFile, physical: Physical) {
  const fixes = file.fixes(finding);
  return fixes.length === 0 ? {} : { fixes: fixes.map((fix) => ({ description: { text: fix.title }, artifactChanges: changesOf(fix, physical, file) })) };
}

function changesOf({ edits }: Fix, physical: Physical, { text }: CheckedFile) {
  return [...new Set(edits.map(({ path }) => path))].map((path) => {
    const ends = text(path).includes('\r\n') ? '\r\n' : '\n';
    return {
      artifactLocation: artifactAt(path),
      replacements: edits.filter((edit) => edit.path === path).map(({ span, newText }) => ({ deletedRegion: regionOf(physical, { path, span }), insertedContent: { text: newText.replace(/\r?\n/g, ends) } })),
    };
  });
}

/** A finding is never shown as nothing; an insertion takes nothing away. */
function regionOf(physical: Physical, place: Place) {
  const { region } = physical(place);
  return place.span.start < place.span.end ? region : { ...region, endLine: region.startLine, endColumn: region.startColumn };
}

const finite = (value: number | null) => (value !== null && Number.isFinite(value) ? value : null);
