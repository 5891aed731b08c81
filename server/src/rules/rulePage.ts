/** The page of a rule, as the reference, the command line's `explain` and the hover show it: Markdown. */
import type { Rule } from './rule';

export function rulePage({ name, severity, waivable, documentation }: Rule): string {
  const { finds, matters, bad, good, models } = documentation;
  return [
    `## ${name}`,
    `${finds}`,
    `Severity: ${severity}. ${waivable ? `\`waive ${name} on NAME because "…"\` keeps it, with a reason.` : 'It cannot be waived.'}`,
    `**Why it matters.** ${matters}`,
    `**With the finding**\n\n${quiet(bad)}`,
    `**Without**\n\n${quiet(good)}`,
    models.length === 0 ? 'It rests on no model.' : `It rests on ${models.map((model) => `\`physics/${model}\``).join(', ')}.`,
  ].join('\n\n');
}

/** All of them, as one file. */
export function ruleReference(rules: readonly Rule[]): string {
  const contents = rules.map(({ name, severity }) => `- [${name}](#${name}): ${severity}`).join('\n');
  return `# Rules\n\nMade from the rules themselves; to change a page, change its rule.\n\n${contents}\n\n${rules.map(rulePage).join('\n\n')}\n`;
}

function quiet(text: string): string {
  return `\`\`\`quiet\n${text}\`\`\``;
}
