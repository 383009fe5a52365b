const empty = new Set(['meta', 'br', 'wbr', 'line', 'path', 'circle', 'rect']);

/** Names of all tags of an HTML text, and the tags that are not closed in their order. */
export function tagsOf(html: string): { names: Set<string>; unclosed: string[] } {
  const names = new Set<string>();
  const open: string[] = [];
  const unclosed: string[] = [];
  for (const [, slash, name = '', rest = ''] of html.matchAll(/<(\/?)([a-z][a-z0-9]*)([^>]*)>/gi)) {
    names.add(name);
    if (slash === '/') {
      const last = open.pop();
      if (last !== name) unclosed.push(`${last} before </${name}>`);
    } else if (!rest.endsWith('/') && !empty.has(name)) open.push(name);
  }
  return { names, unclosed: [...unclosed, ...open] };
}
