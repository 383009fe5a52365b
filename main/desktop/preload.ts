import { contextBridge, type IpcRendererEvent, ipcRenderer } from 'electron';
import {
  type Answer,
  channels,
  type DesktopApi,
  type MenuCommand,
  type OpenedSheet,
} from './channels.ts';

/** Only these calls cross, each on its own channel; the screen never holds ipcRenderer. */
const api: DesktopApi = {
  openSheet: () => ipcRenderer.invoke(channels.openSheet),
  openExports: () => ipcRenderer.invoke(channels.openExports),
  saveSheet: (request) => ipcRenderer.invoke(channels.saveSheet, request),
  exportText: (request) => ipcRenderer.invoke(channels.exportText, request),
  exportPdf: (request) => ipcRenderer.invoke(channels.exportPdf, request),
  onCommand: (listener) => listen(channels.command, (command: MenuCommand) => listener(command)),
  onOpenRequested: (listener) =>
    listen(channels.openRequested, (opened: Answer<OpenedSheet>) => listener(opened)),
  setUnsaved: (unsaved) => ipcRenderer.send(channels.setUnsaved, unsaved),
};

function listen<T>(channel: string, act: (value: T) => void): () => void {
  const listener = (_event: IpcRendererEvent, value: T): void => act(value);
  ipcRenderer.on(channel, listener);
  return () => {
    ipcRenderer.removeListener(channel, listener);
  };
}

contextBridge.exposeInMainWorld('monobisDesktop', api);
