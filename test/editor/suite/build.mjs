/** Bundles the suite for both hosts. */
import path from 'node:path';
import { fileURLToPath } from 'node:url';
import { build } from 'esbuild';

const here = path.dirname(fileURLToPath(import.meta.url));
const root = path.resolve(here, '../../..');

/** Paths of the bundles, from the project's folder, which is the extension's. */
export const bundles = { web: 'test/editor/.out/suite.web.cjs', node: 'test/editor/.out/suite.node.cjs' };

/** `only`: tests with these words in their titles; all where it is empty. */
export async function buildSuite(only = '') {
  const shared = { absWorkingDir: root, bundle: true, format: 'cjs', sourcemap: 'inline', logLevel: 'warning', define: { ONLY: JSON.stringify(only) } };
  await build({ ...shared, entryPoints: [path.join(here, 'index.node.ts')], outfile: bundles.node, platform: 'node', target: 'node20', external: ['vscode', 'mocha'] });
  await build({ ...shared, entryPoints: [path.join(here, 'index.web.ts')], outfile: bundles.web, platform: 'browser', target: 'es2022', external: ['vscode'], logOverride: { 'commonjs-variable-in-esm': 'silent' } });
}
