import { execFile } from 'node:child_process';
import { cp, mkdir, mkdtemp, readFile, rm, symlink, writeFile } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { promisify } from 'node:util';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';

const root = path.resolve(import.meta.dirname, '../../..');
const call = promisify(execFile);

interface Cruise {
  readonly summary: {
    readonly totalCruised: number;
    readonly violations: readonly { readonly rule: { readonly name: string } }[];
  };
}

/** Cruises the three rooms under `folder` by the rules of the house. */
async function cruise(folder: string): Promise<Cruise['summary']> {
  const tool = path.join(root, 'node_modules/.bin/depcruise');
  const args = [
    '--config',
    '.dependency-cruiser.cjs',
    '--output-type',
    'json',
    'analysis',
    'main',
    'renderer',
  ];
  const output = await call(tool, args, { cwd: folder, maxBuffer: 1 << 28 }).then(
    ({ stdout }) => stdout,
    // it exits with the number of violations; the report is on standard output all the same
    (error: { stdout: string }) => error.stdout,
  );
  const { summary } = JSON.parse(output) as Cruise;
  return summary;
}

const planted = [
  [
    'analysis/spectrum/planted.ts',
    "import '../split/amounts.ts';",
    'analysis-spectrum-looks-down-only',
  ],
  [
    'analysis/unmixing/planted.ts',
    "import '../split/amounts.ts';",
    'analysis-unmixing-looks-down-only',
  ],
  [
    'analysis/spectrum/planted.ts',
    "import '../sheet/defaults.ts';",
    'analysis-spectrum-looks-down-only',
  ],
  ['analysis/split/planted.ts', "import 'node:fs';", 'analysis-uses-no-node'],
  ['main/planted.ts', "import '../analysis/quantify.ts';", 'only-one-door-to-analysis'],
  ['renderer/planted.ts', "import '../analysis/sheet/schema.ts';", 'only-one-door-to-analysis'],
  [
    'renderer/planted.ts',
    "import '../main/command/run.ts';",
    'main-and-renderer-share-only-channel-types',
  ],
  [
    'main/planted.ts',
    "import '../renderer/sections/section.ts';",
    'main-does-not-reach-into-the-screen',
  ],
  ['analysis/split/planted.ts', "import '../../main/command/run.ts';", 'analysis-knows-no-outside'],
] as const;

describe('the import rule', () => {
  let copy = '';

  beforeAll(async () => {
    copy = await mkdtemp(path.join(tmpdir(), 'monobis-layers-'));
    for (const room of ['analysis', 'main', 'renderer']) {
      await cp(path.join(root, room), path.join(copy, room), { recursive: true });
    }
    for (const file of ['.dependency-cruiser.cjs', 'tsconfig.json', 'package.json']) {
      await writeFile(path.join(copy, file), await readFile(path.join(root, file)));
    }
    await symlink(path.join(root, 'node_modules'), path.join(copy, 'node_modules'));
  });

  afterAll(async () => {
    await rm(copy, { recursive: true, force: true });
  });

  it('holds in the house as it stands, and every module was looked at', async () => {
    const { violations, totalCruised } = await cruise(root);
    expect(violations).toEqual([]);
    // the checker can cruise nothing and report success
    expect(totalCruised).toBeGreaterThan(60);
  });

  it.each(planted)('is seen to fail: %s with "%s"', async (file, text, rule) => {
    const place = path.join(copy, file);
    await mkdir(path.dirname(place), { recursive: true });
    await writeFile(place, `${text}\n`);
    const { violations } = await cruise(copy);
    await rm(place);
    expect(violations.map(({ rule: { name } }) => name)).toContain(rule);
  });

  it('is seen to fail on a circle', async () => {
    const [one, two] = ['one', 'two'].map((name) => path.join(copy, `analysis/split/${name}.ts`));
    await writeFile(one!, "import './two.ts';\n");
    await writeFile(two!, "import './one.ts';\n");
    const { violations } = await cruise(copy);
    await Promise.all([rm(one!), rm(two!)]);
    expect(violations.map(({ rule: { name } }) => name)).toContain('no-circles');
  });
});
