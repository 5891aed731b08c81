/** Findings of the façade as the protocol's diagnostics. */
import { DiagnosticSeverity, DiagnosticTag, type Diagnostic, type DiagnosticRelatedInformation, type Range } from 'vscode-languageserver';
import type { TextDocument } from 'vscode-languageserver-textdocument';
import type { Place } from '../board/model';
import type { Finding, Severity } from '../rules/rule';
import type { Span } from '../syntax/tree';
import type { Documents } from './documents';
import { rangeOf } from './positions';

const severities: Record<Severity, DiagnosticSeverity> = {
  error: DiagnosticSeverity.Error,
  warning: DiagnosticSeverity.Warning,
  information: DiagnosticSeverity.Information,
  hint: DiagnosticSeverity.Hint,
};

export interface FindingsToShow {
  readonly documents: Documents;
  /** Scheme of the addresses under which the client shows the page of a rule; null where it does not. */
  readonly rulePages: string | null;
}

export function diagnosticOf(finding: Finding, document: TextDocument, { documents, rulePages }: FindingsToShow): Diagnostic {
  const { rule, severity, message, at, related, waived } = finding;
  return {
    range: visibleRange(document, at.span),
    // A waived finding is kept, and asks for nothing.
    severity: waived === null ? severities[severity] : DiagnosticSeverity.Hint,
    source: 'quietrun',
    code: rule,
    message: waived === null ? message : `${message}\nwaived: ${waived}`,
    ...(rulePages === null ? {} : { codeDescription: { href: `${rulePages}:/${rule}.md` } }),
    ...(rule === 'unused-declaration' ? { tags: [DiagnosticTag.Unnecessary] } : {}),
    ...(related.length === 0 ? {} : { relatedInformation: related.flatMap(({ place, message: words }) => relatedPlace(documents, place, words)) }),
  };
}

function relatedPlace(documents: Documents, place: Place, message: string): DiagnosticRelatedInformation[] {
  const document = documents.textOf(place.path);
  if (document === null) return [];
  return [{ location: { uri: documents.paths.uriOf(place.path), range: visibleRange(document, place.span) }, message }];
}

/** An empty span, where something is missing, is shown at the character beside it. */
function visibleRange(document: TextDocument, { start, end }: Span): Range {
  if (start < end) return rangeOf(document, { start, end });
  const after = document.getText({ start: document.positionAt(start), end: document.positionAt(start + 1) });
  if (after !== '' && !/\s/.test(after)) return rangeOf(document, { start, end: start + 1 });
  return rangeOf(document, { start: Math.max(0, start - 1), end: start });
}
