/** A client that says that it shows pictures gets them in hovers; any other gets the same in words. */
import assert from 'node:assert/strict';
import { describe, it } from 'node:test';
import type { Hover, MarkupContent } from 'vscode-languageserver-protocol/node';
import type { ClientOptions } from '../../server/src/lsp/messages';
import { startClient } from './client';

const uri = 'file:///b.quiet';
const text = 'board b { clearance 0.12 mm }\nstackup main { copper TOP 35 um; prepreg 0.2 mm er 4.2; plane GND 18 um }\nnet CLK { swing 3.3 V; rise 1 ns; source 50 ohm; load 50 ohm }\nnet RX { source 50 ohm; load 50 ohm; tolerates 20 mV peak }\nrun past on TOP for 38 mm {\n  trace CLK 0.25 mm\n  gap 0.3 mm\n  trace RX 0.15 mm\n}\n';

async function hovers(options: ClientOptions, points: readonly { readonly line: number; readonly character: number }[], until = /^never$/): Promise<readonly string[]> {
  const client = await startClient({ options });
  try {
    await client.open(uri, text);
    const said: string[] = [];
    for (const position of points) {
      if (0 < said.length) await new Promise((resolve) => setTimeout(resolve, betweenLooks));
      const hover = await client.connection.sendRequest<Hover | null>('textDocument/hover', { textDocument: { uri }, position });
      said.push((hover?.contents as MarkupContent).value);
      if (until.test(said.at(-1)!)) break;
    }
    return said;
  } finally {
    await client.stop();
  }
}

const [net, gap] = [{ line: 3, character: 5 }, { line: 6, character: 7 }];

/** Milliseconds in which a point of the curve is computed: a look puts off what waits, and what it has computed stays. */
const betweenLooks = 250;

describe('hover over the wire', () => {
  it('holds no picture for a client that does not ask for them', async () => {
    for (const said of await hovers({}, [net, gap])) assert.ok(0 < said.length && !said.includes('data:') && !said.includes('!['), said);
  });

  it('holds pictures for one that does', async () => {
    const [said] = await hovers({ showsPictures: true }, [net]);
    assert.match(said!, /!\[Noise on RX: .*\]\(data:image\/svg\+xml;base64,/);
  });

  it('has the noise against a gap by the time that somebody looks again', async () => {
    const drawn = /!\[Noise on RX against this gap: .*\]\(data:/;
    const looks = await hovers({ showsPictures: true }, Array.from({ length: 20 }, () => gap), drawn);
    assert.match(looks.at(-1)!, drawn);
  });
});
