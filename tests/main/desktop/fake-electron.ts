import { EventEmitter } from 'node:events';
import { vi } from 'vitest';

/** A stand-in for Electron that remembers what it was told. Only what the shell uses. */

export const dialog = {
  showOpenDialog: vi.fn(async () => ({ canceled: true, filePaths: [] as string[] })),
  showSaveDialog: vi.fn(async () => ({ canceled: true, filePath: '' })),
  showMessageBoxSync: vi.fn(() => 0),
  showMessageBox: vi.fn(async () => ({ response: 0 })),
};

export class FakeContents extends EventEmitter {
  windowOpen: (() => { action: string }) | null = null;
  readonly sent: unknown[][] = [];
  readonly session = { webRequest: { onBeforeRequest: vi.fn() } };
  readonly printToPDF = vi.fn(async () => Buffer.from('%PDF-1.7'));
  setWindowOpenHandler(handler: () => { action: string }): void {
    this.windowOpen = handler;
  }
  send(...args: unknown[]): void {
    this.sent.push(args);
  }
}

export const windows: BrowserWindow[] = [];

export class BrowserWindow extends EventEmitter {
  readonly webContents = new FakeContents();
  readonly loadURL = vi.fn(async (_url: string) => {});
  readonly show = vi.fn();
  readonly destroy = vi.fn();
  readonly options: { webPreferences: Record<string, unknown> };
  constructor(options: { webPreferences: Record<string, unknown> }) {
    super();
    this.options = options;
    windows.push(this);
  }
}

export class FakeIpc {
  readonly handlers = new Map<string, (event: unknown, ...args: unknown[]) => Promise<unknown>>();
  readonly listeners = new Map<string, (event: unknown, ...args: unknown[]) => void>();
  handle(channel: string, handler: (event: unknown, ...args: unknown[]) => Promise<unknown>): void {
    this.handlers.set(channel, handler);
  }
  on(channel: string, listener: (event: unknown, ...args: unknown[]) => void): void {
    this.listeners.set(channel, listener);
  }
}
