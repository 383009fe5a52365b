import { type Node, type ParseError, parseTree, printParseErrorCode } from 'jsonc-parser';
import * as v from 'valibot';
import { Refusal, type Where } from '../refusal.ts';
import { checkReferences } from './check-references.ts';
import { type Sheet, sheetSchema } from './schema.ts';
import { unknownMembers } from './unknown-members.ts';

export interface OpenedSheetText {
  readonly sheet: Sheet;
  /** Members this program does not know; they are kept on save. */
  readonly warnings: readonly string[];
}

const largestSheetCharacters = 512 * 1024 * 1024;
const deepestNesting = 100;

/**
 * Reads and checks a sheet. Throws a `Refusal` that names the line, what is wrong and what would
 * mend it; nothing is half accepted.
 */
export function openSheet(text: string, file = 'the sheet'): OpenedSheetText {
  if (text.length > largestSheetCharacters) {
    throw new Refusal({
      code: 'sheet-too-large',
      message: 'The sheet is larger than 512 million characters.',
      where: { file },
      mend: 'Keep the spectra as files beside the sheet, or split the sheet by run.',
    });
  }
  const source = text.startsWith('\uFEFF') ? text.slice(1) : text;
  const tree = parseJson(source, file);
  const value: unknown = JSON.parse(source);
  checkFormat(value, file);
  const parsed = v.safeParse(sheetSchema, value);
  if (!parsed.success) {
    const issue = parsed.issues[0];
    const path = issue.path?.map((part) => String(part.key)) ?? [];
    throw new Refusal({
      code: 'sheet-invalid',
      message: `${memberName(path)} ${issueText(issue)}.`,
      where: { file, ...lineOf(source, tree, path) },
      mend: 'Correct this member; the format is described in SHEET.md, and a sheet saved by the app is always right.',
    });
  }
  const sheet: Sheet = parsed.output;
  const fault = checkReferences(sheet);
  if (fault) {
    throw new Refusal({
      code: fault.code,
      message: fault.message,
      where: { file, ...lineOf(source, tree, fault.path) },
      mend: fault.mend,
    });
  }
  return { sheet, warnings: unknownMembers(sheet) };
}

function parseJson(source: string, file: string): Node {
  if (source.trim() === '') {
    throw new Refusal({
      code: 'sheet-empty',
      message: 'The file is empty.',
      where: { file },
      mend: 'Open another file, or begin a new sheet.',
    });
  }
  refuseTooDeep(source, file);
  const errors: ParseError[] = [];
  const tree = parseTree(source, errors, { disallowComments: true, allowTrailingComma: false });
  const first = errors[0];
  if (first) {
    throw new Refusal({
      code: 'sheet-not-json',
      message: `This is not a whole JSON document (${words(printParseErrorCode(first.error))}).`,
      where: { file, line: lineAt(source, first.offset) },
      mend: 'Open a file saved as *.sheet.json; an export is loaded as a standard or an aliquot instead.',
    });
  }
  if (!tree) throw new Error('the JSON parser returned neither a tree nor an error');
  const twice = duplicateMember(tree);
  if (twice) {
    throw new Refusal({
      code: 'sheet-duplicate-member',
      message: `The member "${twice.name}" stands twice in one place, so one of them would be lost.`,
      where: { file, line: lineAt(source, twice.offset) },
      mend: 'Delete the one that is not meant.',
    });
  }
  return tree;
}

/** Nesting that no sheet needs would overflow the parser's stack. */
function refuseTooDeep(source: string, file: string): void {
  let depth = 0;
  let inText = false;
  for (let i = 0; i < source.length; i++) {
    const code = source.charCodeAt(i);
    if (inText) {
      if (code === 0x5c) i++;
      else if (code === 0x22) inText = false;
    } else if (code === 0x22) inText = true;
    else if (code === 0x5b || code === 0x7b) depth++;
    else if (code === 0x5d || code === 0x7d) depth--;
    if (depth <= deepestNesting) continue;
    throw new Refusal({
      code: 'sheet-too-deep',
      message: `The document is nested more than ${deepestNesting} deep; a sheet is not.`,
      where: { file, line: lineAt(source, i) },
      mend: 'Open a file saved as *.sheet.json.',
    });
  }
}

function checkFormat(value: unknown, file: string): void {
  const is = typeof value === 'object' && value !== null ? value : {};
  const format = 'format' in is ? is.format : undefined;
  const version = 'version' in is ? is.version : undefined;
  if (format !== 'monobis-sheet') {
    throw new Refusal({
      code: 'not-a-sheet',
      message: 'This JSON file is not a sheet: its "format" is not "monobis-sheet".',
      where: { file },
      mend: 'Open a file saved as *.sheet.json.',
    });
  }
  if (typeof version === 'number' && version > 1) {
    throw new Refusal({
      code: 'sheet-newer',
      message: `The sheet has version ${version}; this program knows version 1.`,
      where: { file },
      mend: 'Open it with the newer program that wrote it.',
    });
  }
}

function issueText(issue: v.BaseIssue<unknown>): string {
  if (issue.type === 'loose_object' && issue.input === undefined) return 'is missing';
  if (issue.received === 'undefined') return 'is missing';
  return issue.message.startsWith('Invalid')
    ? `is ${shown(issue.input)}, which is not what belongs here`
    : `${issue.message} (found ${shown(issue.input)})`;
}

function shown(input: unknown): string {
  const text = JSON.stringify(input) ?? 'nothing';
  return text.length > 60 ? `${text.slice(0, 57)}…` : text;
}

function memberName(path: readonly string[]): string {
  let name = '';
  for (const part of path) {
    name += /^\d+$/.test(part) ? `[${Number(part) + 1}]` : `${name === '' ? '' : '.'}${part}`;
  }
  return name === '' ? 'The sheet' : `"${name}"`;
}

function words(code: string): string {
  return code.replace(/([a-z])([A-Z])/g, '$1 $2').toLowerCase();
}

function lineAt(source: string, offset: number): number {
  let line = 1;
  for (let i = source.indexOf('\n'); i !== -1 && i < offset; i = source.indexOf('\n', i + 1))
    line++;
  return line;
}

/** Line of the deepest part of the path that is there. */
function lineOf(source: string, tree: Node, path: readonly string[]): Pick<Where, 'line'> {
  let node = tree;
  for (const key of path) {
    const next = childOf(node, key);
    if (!next) break;
    node = next;
  }
  return { line: lineAt(source, node.offset) };
}

function childOf(node: Node, key: string): Node | undefined {
  if (node.type === 'array') return node.children?.[Number(key)];
  const property = node.children?.find((child) => child.children?.[0]?.value === key);
  return property?.children?.[1];
}

function duplicateMember(root: Node): { name: string; offset: number } | null {
  const open: Node[] = [root];
  for (let node = open.pop(); node; node = open.pop()) {
    if (node.type === 'object') {
      const seen = new Set<string>();
      for (const property of node.children ?? []) {
        const name = String(property.children?.[0]?.value);
        if (seen.has(name)) return { name, offset: property.offset };
        seen.add(name);
      }
    }
    for (const child of node.children ?? []) {
      if (child.children) open.push(child);
    }
  }
  return null;
}
