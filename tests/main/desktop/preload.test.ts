import { expect, it, vi } from 'vitest';

vi.mock('electron', () => import('./fake-electron.ts'));

const { contextBridge, ipcRenderer } = await import('./fake-electron.ts');
const { channels } = await import('../../../main/desktop/channels.ts');
await import('../../../main/desktop/preload.ts');

const [name, exposed] = contextBridge.exposeInMainWorld.mock.calls[0] ?? [];
const api = exposed as import('../../../main/desktop/channels.ts').DesktopApi;

it('the page gets our calls and nothing of Electron', () => {
  expect(name).toBe('monobisDesktop');
  expect(Object.keys(api).sort()).toEqual([
    'exportPdf',
    'exportText',
    'onCommand',
    'onOpenRequested',
    'openExports',
    'openSheet',
    'saveSheet',
    'setUnsaved',
  ]);
  expect(contextBridge.exposeInMainWorld).toHaveBeenCalledOnce();
});

it('each call goes by its own channel, with its own argument', async () => {
  const save = { text: 'x', handle: null, suggestedName: 'a' };
  const text = { text: 'x', suggestedName: 'a', kind: 'csv' } as const;
  const pdf = { html: 'x', suggestedName: 'a' };
  expect(await api.openSheet()).toEqual([channels.openSheet]);
  expect(await api.openExports()).toEqual([channels.openExports]);
  expect(await api.saveSheet(save)).toEqual([channels.saveSheet, save]);
  expect(await api.exportText(text)).toEqual([channels.exportText, text]);
  expect(await api.exportPdf(pdf)).toEqual([channels.exportPdf, pdf]);
  api.setUnsaved(true);
  expect(ipcRenderer.send.mock.calls).toEqual([[channels.setUnsaved, true]]);
});

it('a listener hears its commands without the event they came with, until it stops', () => {
  const listener = vi.fn();
  const stop = api.onCommand(listener);
  ipcRenderer.emit(channels.command, { sender: ipcRenderer }, 'undo');
  stop();
  ipcRenderer.emit(channels.command, { sender: ipcRenderer }, 'redo');
  expect(listener.mock.calls).toEqual([['undo']]);
});
