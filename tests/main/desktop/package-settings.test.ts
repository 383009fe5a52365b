import { readFileSync } from 'node:fs';
import path from 'node:path';
import { Ajv } from 'ajv';
import { load } from 'js-yaml';
import * as v from 'valibot';
import { expect, it } from 'vitest';

const root = path.resolve(import.meta.dirname, '../../..');
const settings = load(readFileSync(path.join(root, 'electron-builder.yml'), 'utf8'));
const schema = JSON.parse(
  readFileSync(path.join(root, 'node_modules/app-builder-lib/scheme.json'), 'utf8'),
);

it("the packaging settings satisfy electron-builder's own schema", () => {
  const check = new Ajv({ allErrors: true, strict: false }).compile(schema);
  check(settings);
  expect(check.errors ?? []).toEqual([]);
});

it('a wrong member is seen by that schema', () => {
  const check = new Ajv({ strict: false }).compile(schema);
  expect(check({ ...v.parse(v.looseObject({}), settings), asarr: true })).toBe(false);
});

it('only what is built goes along, sealed', () => {
  const { files, asar, electronFuses } = v.parse(
    v.looseObject({
      files: v.array(v.string()),
      asar: v.literal(true),
      electronFuses: v.looseObject({}),
    }),
    settings,
  );
  expect(asar).toBe(true);
  expect(
    files
      .filter((file) => !file.startsWith('!'))
      .every((file) => /^(dist\/|package\.json$)/.test(file)),
  ).toBe(true);
  expect(electronFuses).toMatchObject({ runAsNode: false, onlyLoadAppFromAsar: true });
});
