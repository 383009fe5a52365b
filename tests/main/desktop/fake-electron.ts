import { EventEmitter } from 'node:events';
import type * as Real from 'electron';
import { vi } from 'vitest';

/**
 * A stand-in for Electron that remembers what it was told: only what the shell uses, with the real
 * names and signatures, so that a change of Electron's is a type error here.
 */

export const dialog = {
  showOpenDialog: vi.fn(
    async (..._: unknown[]): Promise<Real.OpenDialogReturnValue> => ({
      canceled: true,
      filePaths: [],
    }),
  ),
  showSaveDialog: vi.fn(
    async (..._: unknown[]): Promise<Real.SaveDialogReturnValue> => ({
      canceled: true,
      filePath: '',
    }),
  ),
  showMessageBox: vi.fn(
    async (..._: unknown[]): Promise<Real.MessageBoxReturnValue> => ({
      response: 0,
      checkboxChecked: false,
    }),
  ),
  showMessageBoxSync: vi.fn((..._: unknown[]) => 0),
  showErrorBox: vi.fn((_title: string, _content: string) => {}),
} satisfies Partial<Record<keyof Real.Dialog, unknown>>;

export class FakeProtocol
  implements Pick<Real.Protocol, 'handle' | 'isProtocolHandled' | 'registerSchemesAsPrivileged'>
{
  readonly handlers = new Map<string, Parameters<Real.Protocol['handle']>[1]>();
  readonly schemes: Real.CustomScheme[] = [];
  handle(scheme: string, handler: Parameters<Real.Protocol['handle']>[1]): void {
    this.handlers.set(scheme, handler);
  }
  isProtocolHandled(scheme: string): boolean {
    return this.handlers.has(scheme);
  }
  registerSchemesAsPrivileged(schemes: Real.CustomScheme[]): void {
    this.schemes.push(...schemes);
  }
}

export class FakeSession extends EventEmitter {
  readonly protocol = new FakeProtocol();
  readonly webRequest = {
    onBeforeRequest: vi.fn(
      (_listener: (details: { url: string }, decide: (answer: object) => void) => void) => {},
    ),
  };
  readonly setPermissionRequestHandler = vi.fn(
    (_handler: Parameters<Real.Session['setPermissionRequestHandler']>[0]) => {},
  );
  readonly setPermissionCheckHandler = vi.fn(
    (_handler: Parameters<Real.Session['setPermissionCheckHandler']>[0]) => {},
  );
  readonly setDevicePermissionHandler = vi.fn(
    (_handler: Parameters<Real.Session['setDevicePermissionHandler']>[0]) => {},
  );
}

const partitions = new Map<string, FakeSession>();
export const session = {
  defaultSession: new FakeSession(),
  fromPartition: (name: string): FakeSession => {
    const known = partitions.get(name) ?? new FakeSession();
    partitions.set(name, known);
    return known;
  },
};

export class FakeContents
  extends EventEmitter
  implements Pick<Real.WebContents, 'send' | 'printToPDF' | 'setWindowOpenHandler'>
{
  windowOpen: ((details: Real.HandlerDetails) => Real.WindowOpenHandlerResponse) | null = null;
  readonly sent: unknown[][] = [];
  readonly printToPDF = vi.fn(async (_options: Real.PrintToPDFOptions) => Buffer.from('%PDF-1.7'));
  setWindowOpenHandler(
    handler: (details: Real.HandlerDetails) => Real.WindowOpenHandlerResponse,
  ): void {
    this.windowOpen = handler;
  }
  send(...args: unknown[]): void {
    this.sent.push(args);
  }
}

export const windows: BrowserWindow[] = [];

export class BrowserWindow
  extends EventEmitter
  implements
    Pick<
      Real.BrowserWindow,
      'show' | 'destroy' | 'focus' | 'restore' | 'isMinimized' | 'isDestroyed' | 'getNormalBounds'
    >
{
  readonly webContents = new FakeContents();
  readonly loadURL = vi.fn(async (_url: string) => {});
  readonly show = vi.fn();
  readonly focus = vi.fn();
  readonly restore = vi.fn();
  readonly destroy = vi.fn();
  readonly isMinimized = vi.fn(() => true);
  readonly isDestroyed = vi.fn(() => false);
  readonly getNormalBounds = vi.fn(() => ({ x: 10, y: 20, width: 1100, height: 800 }));
  readonly options: Real.BrowserWindowConstructorOptions;
  constructor(options: Real.BrowserWindowConstructorOptions) {
    super();
    this.options = options;
    windows.push(this);
    app.emit('web-contents-created', {}, this.webContents);
  }
}

type Listener = (event: unknown, ...args: unknown[]) => unknown;

export class FakeIpc {
  readonly handlers = new Map<string, Listener>();
  readonly listeners = new Map<string, Listener>();
  handle(channel: string, handler: Listener): void {
    this.handlers.set(channel, handler);
  }
  on(channel: string, listener: Listener): void {
    this.listeners.set(channel, listener);
  }
}

class FakeApp
  extends EventEmitter
  implements Pick<Real.App, 'enableSandbox' | 'requestSingleInstanceLock' | 'quit' | 'exit'>
{
  readonly enableSandbox = vi.fn();
  readonly requestSingleInstanceLock = vi.fn(() => true);
  readonly quit = vi.fn();
  readonly exit = vi.fn();
  readonly whenReady = vi.fn(async () => {});
  readonly getPath = vi.fn((_name: string) => '/nowhere');
}

export const app = new FakeApp();
export const ipcMain = new FakeIpc();
export const protocol = new FakeProtocol();
export const Menu = { setApplicationMenu: vi.fn(), buildFromTemplate: vi.fn((given) => given) };
export const screen = {
  getAllDisplays: () => [{ workArea: { x: 0, y: 0, width: 1920, height: 1080 } }],
};

export const contextBridge = { exposeInMainWorld: vi.fn((_name: string, _api: unknown) => {}) };
export const ipcRenderer = Object.assign(new EventEmitter(), {
  invoke: vi.fn(async (channel: string, ...args: unknown[]) => [channel, ...args]),
  send: vi.fn((_channel: string, ..._args: unknown[]) => {}),
});

/** As if nothing had ever been asked of it. */
export function forget(): void {
  vi.resetAllMocks();
  windows.length = 0;
  for (const emitter of [app, session.defaultSession, ipcRenderer]) emitter.removeAllListeners();
  for (const map of [partitions, protocol.handlers, ipcMain.handlers, ipcMain.listeners])
    map.clear();
  protocol.schemes.length = 0;
}

/** The stand-ins have what the shell uses of the real ones: the one place where they are taken for them. */
export const asReal = {
  contents: (fake: FakeContents) => fake as unknown as Real.WebContents,
  session: (fake: FakeSession) => fake as unknown as Real.Session,
  window: (fake: BrowserWindow) => fake as unknown as Real.BrowserWindow,
  ipcMain: (fake: FakeIpc) => fake as unknown as Real.IpcMain,
  frame: (frame: { url: string; parent: unknown } | null) =>
    ({ senderFrame: frame }) as unknown as Real.IpcMainInvokeEvent,
};

/** The other way round: what the shell made is one of the stand-ins. */
export function lastWindow(): BrowserWindow {
  const window = windows.at(-1);
  if (!window) throw new Error('no window was made');
  return window;
}
