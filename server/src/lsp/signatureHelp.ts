import { MarkupKind, SignatureHelpTriggerKind, type SignatureHelp } from 'vscode-languageserver';
import { beginsValues, signaturesAt } from '../service/signatures';
import type { Server } from './server';

/** A space, since nothing else parts the values of a statement; most spaces are answered with nothing. */
export const signatureTriggers = { triggerCharacters: [' '], retriggerCharacters: [' ', ',', '(', '"'] };

export function answerSignatureHelp({ connection, guard, documents, capabilities }: Server): void {
  connection.onSignatureHelp(guard('signature help', null, async ({ textDocument, position, context }): Promise<SignatureHelp | null> => {
    const file = await documents.at(textDocument.uri);
    if (file === null) return null;
    const offset = file.document.offsetAt(position);
    const unasked = context?.triggerKind === SignatureHelpTriggerKind.TriggerCharacter && !context.isRetrigger;
    if (unasked && !beginsValues(documents.session, file.path, offset)) return null;
    const signatures = signaturesAt(documents.session, file.path, offset);
    if (signatures.length === 0) return null;
    const takesOffsets = capabilities().textDocument?.signatureHelp?.signatureInformation?.parameterInformation?.labelOffsetSupport === true;
    const chosen = Math.min(Math.max(0, signatures.findIndex(({ label }) => label === context?.activeSignatureHelp?.signatures[context.activeSignatureHelp.activeSignature ?? 0]?.label)), signatures.length - 1);
    return {
      signatures: signatures.map(({ label, about, parameters, active }) => ({
        label, documentation: about, activeParameter: active,
        parameters: parameters.map(({ start, end, about: words }) => ({ label: takesOffsets ? [start, end] : label.slice(start, end), ...(words === '' ? {} : { documentation: { kind: MarkupKind.Markdown, value: words } }) })),
      })),
      activeSignature: chosen,
      activeParameter: signatures[chosen]!.active,
    };
  }));
}
