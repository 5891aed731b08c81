/** The published schema is the one that the code validates with. `UPDATE=1` writes it anew. */
import assert from 'node:assert/strict';
import { existsSync, mkdirSync, readFileSync, writeFileSync } from 'node:fs';
import { it } from 'node:test';
import { z } from 'zod';
import { checkSchema } from '../../server/src/cli/checkSchema';

const published = 'server/schema/check.schema.json';

it('publishes its JSON schema', () => {
  const text = `${JSON.stringify({ title: 'quietrun check --format json', ...z.toJSONSchema(checkSchema) }, null, 2)}\n`;
  if (process.env['UPDATE'] === '1') {
    mkdirSync('server/schema', { recursive: true });
    writeFileSync(published, text);
  }
  assert.ok(existsSync(published), `${published} is missing: UPDATE=1 writes it`);
  assert.equal(readFileSync(published, 'utf8'), text);
});
