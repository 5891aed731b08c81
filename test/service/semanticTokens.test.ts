/** Words of a board and what they are said to stand for. */
import assert from 'node:assert/strict';
import { describe, it } from 'node:test';
import { Session } from '../../server/src/service/session';
import { semanticTokens } from '../../server/src/service/semanticTokens';

const board = `stackup { copper TOP 35 um; prepreg 0.2 mm er 4.2; plane GND 18 um } # µ Ω 🔌
family loud { swing 24 V; rise 10 ns; source 5 ohm; load 1 kohm; switches with GATES }
net CLOCK is loud
net SENSE { source 1 kohm; load 1 Mohm; tolerates 1 mV peak }
net CALM { source 1 kohm; load 1 Mohm; tolerates 9 V peak }
run r on TOP for 30 mm {
  trace CLOCK 0.2 mm; gap 0.2 mm; trace SENSE 0.2 mm; gap 3 mm; trace CALM 0.2 mm
}
`;

function tokensOf(text: string, within = { start: 0, end: text.length }): readonly string[] {
  const session = new Session();
  session.setText('a', text);
  return semanticTokens(session, 'a', within).map(({ span, type, declaration, overBudget }) => `${text.slice(span.start, span.end)} ${type}${declaration ? ' declared' : ''}${overBudget ? ' over' : ''}`);
}

describe('semantic tokens', () => {
  const tokens = tokensOf(board);

  it('tell nets, layers, families, groups and the rest apart', () => {
    for (const wanted of ['TOP layer declared', 'TOP layer', 'GND layer declared', 'loud family declared', 'loud family', 'GATES group', 'CLOCK net declared', 'CLOCK net', 'r part declared', '0.2 quantity', 'mm unit', '4.2 quantity', 'ohm unit']) {
      assert.ok(tokens.includes(wanted), `${wanted} is not among ${tokens.join(', ')}`);
    }
  });

  it('mark what is over its budget wherever it stands, and nothing else', () => {
    assert.deepEqual(tokens.filter((each) => each.endsWith(' over')), ['SENSE net declared over', 'SENSE net over']);
  });

  it('mark nothing that is waived', () => {
    assert.deepEqual(tokensOf(`${board}waive over-budget on SENSE because "as measured"\n`).filter((each) => each.endsWith(' over')), []);
  });

  it('are the same with CRLF', () => assert.deepEqual(tokensOf(board.replaceAll('\n', '\r\n')), tokens));

  it('can be had of a part of the file', () => {
    const start = board.indexOf('net SENSE');
    assert.deepEqual(tokensOf(board, { start, end: start + 'net SENSE { source 1 kohm'.length }), ['SENSE net declared over', '1 quantity', 'kohm unit']);
  });

  it('never overlap, are never empty and stay within a line, in a text that is broken', () => {
    for (let cut = 0; cut < board.length; cut += 3) {
      const text = board.slice(0, cut) + board.slice(cut + 2);
      const session = new Session();
      session.setText('a', text);
      let last = 0;
      for (const { span } of semanticTokens(session, 'a', { start: 0, end: text.length })) {
        assert.ok(last <= span.start && span.start < span.end && !text.slice(span.start, span.end).includes('\n'), `${cut}: ${text.slice(span.start, span.end)}`);
        last = span.end;
      }
    }
  });
});
