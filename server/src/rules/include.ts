import { textRule } from './textRule';

export const include = textRule('include', {
  finds: 'A `use` that cannot be followed: no such file, outside the workspace folder, spelt in another case than the file’s name, or leading back to itself.',
  matters: 'What the file declares is missing from every budget. A path in another case works on one computer and fails on the next.',
  bad: `use "common/four-layers.quiet"
`,
  good: `use "common/four-layer.quiet"
`,
  models: [],
});
