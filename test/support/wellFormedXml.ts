/**
 * Reads XML strictly, as far as a report of tests and a picture use it: one root, elements that close, attributes once each, only characters and
 * entities that XML 1.0 allows. Throws where a consumer's parser would.
 */
export interface XmlElement {
  readonly name: string;
  readonly attributes: ReadonlyMap<string, string>;
  readonly children: readonly XmlElement[];
  readonly text: string;
}

export function readXml(xml: string): XmlElement {
  if (/[^\t\n\r\u0020-\ud7ff\ue000-\ufffd\u{10000}-\u{10ffff}]/u.test(xml)) throw new Error('a character that XML 1.0 forbids');
  const body = xml.replace(/^<\?xml version="1\.0" encoding="UTF-8"\?>\n/, '');
  const stack: { name: string; attributes: Map<string, string>; children: XmlElement[]; text: string }[] = [{ name: '', attributes: new Map(), children: [], text: '' }];
  let at = 0;
  while (at < body.length) {
    const top = stack[stack.length - 1];
    if (body[at] !== '<') {
      const end = (body.indexOf('<', at) + body.length + 1) % (body.length + 1);
      top.text += unescaped(body.slice(at, end));
      at = end;
      continue;
    }
    const tag = /^<(?:\/([A-Za-z][A-Za-z0-9-]*)|([A-Za-z][A-Za-z0-9-]*)((?:\s+[A-Za-z][A-Za-z0-9-]*="[^"<]*")*)\s*(\/?))>/.exec(body.slice(at));
    if (tag === null) throw new Error(`no tag at ${body.slice(at, at + 40)}`);
    const [whole, closed, opened, attributes, empty] = tag;
    at += whole.length;
    if (closed !== undefined) {
      if (closed !== top.name) throw new Error(`${closed} closes ${top.name}`);
      stack.pop();
      stack[stack.length - 1].children.push(top);
      continue;
    }
    const given = new Map<string, string>();
    for (const [, key, value] of attributes.matchAll(/([A-Za-z][A-Za-z0-9-]*)="([^"<]*)"/g)) {
      if (given.has(key)) throw new Error(`${key} stands twice`);
      given.set(key, unescaped(value));
    }
    const element = { name: opened, attributes: given, children: [], text: '' };
    if (empty === '') stack.push(element);
    else top.children.push(element);
  }
  const [{ children, text }] = stack;
  if (stack.length !== 1 || children.length !== 1 || text.trim() !== '') throw new Error('not one root');
  return children[0];
}

const entities: Readonly<Record<string, string>> = { amp: '&', lt: '<', gt: '>', quot: '"', apos: "'" };

function unescaped(text: string): string {
  return text.replace(/&([a-z]*);?/g, (whole, name: string) => {
    if (!(name in entities) || !whole.endsWith(';')) throw new Error(`no entity ${whole}`);
    return entities[name];
  });
}
