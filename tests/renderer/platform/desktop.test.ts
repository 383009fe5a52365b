import { describe, expect, it } from 'vitest';
import { Refusal } from '../../../analysis/index.ts';
import type {
  Answer,
  DesktopApi,
  OpenedSheet,
  SaveRequest,
} from '../../../main/desktop/channels.ts';
import { desktopPlatform } from '../../../renderer/platform/desktop.ts';

const refusal = { code: 'cannot-write', message: 'The disk is full.', mend: 'Make room.' };
const refused = { ok: false as const, refusal };

/** The preload's side, where nothing is chosen and nothing happens unless a test says so. */
function api(changes: Partial<DesktopApi> = {}): DesktopApi {
  const nothing = async () => ({ ok: true as const, value: null });
  return {
    openSheet: nothing,
    openExports: async () => ({ ok: true, value: [] }),
    saveSheet: nothing,
    exportText: nothing,
    exportPdf: nothing,
    onCommand: () => () => {},
    onOpenRequested: () => () => {},
    setUnsaved: () => {},
    ...changes,
  };
}

describe('the page inside the desktop shell', () => {
  it('saves where the sheet came from without asking, by the handle the shell gave', async () => {
    const requests: SaveRequest[] = [];
    const platform = desktopPlatform(
      api({
        saveSheet: async (request) => {
          requests.push(request);
          return { ok: true, value: { name: 'a.sheet.json', handle: 'h1' } };
        },
      }),
    );
    const saved = await platform.saveSheet('{}', 'h1', 'a.sheet.json');
    expect(saved).toEqual({ name: 'a.sheet.json', handle: 'h1' });
    await platform.saveSheet('{}', null, 'b.sheet.json');
    // a browser's handle means nothing here: the shell asks
    await platform.saveSheet('{}', { createWritable: () => {} }, 'c.sheet.json');
    expect(requests.map(({ handle }) => handle)).toEqual(['h1', null, null]);
  });

  it('tells a closed dialog from a refusal, which keeps its words', async () => {
    expect(await desktopPlatform(api()).openSheet()).toBeNull();
    expect(await desktopPlatform(api()).saveSheet('{}', null, 'a')).toBeNull();
    const saving = desktopPlatform(api({ saveSheet: async () => refused })).saveSheet(
      '{}',
      null,
      'a',
    );
    await expect(saving).rejects.toSatisfy(
      (error) => error instanceof Refusal && error.mend === 'Make room.',
    );
  });

  it('hands on a sheet the system asked to open, and why one could not be', () => {
    const answers: ((opened: Answer<OpenedSheet>) => void)[] = [];
    const platform = desktopPlatform(
      api({
        onOpenRequested: (listener) => {
          answers.push(listener);
          return () => {};
        },
      }),
    );
    const [sources, errors]: [unknown[], unknown[]] = [[], []];
    platform.onOpenRequested(
      (source) => sources.push(source),
      (error) => errors.push(error),
    );
    const opened = { name: 'a', handle: 'h', text: '{}', files: [], missing: [] };
    for (const answer of answers) {
      answer({ ok: true, value: opened });
      answer(refused);
    }
    expect(sources).toEqual([opened]);
    expect(errors).toHaveLength(1);
    expect(errors[0]).toBeInstanceOf(Refusal);
  });
});
