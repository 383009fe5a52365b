import { describe, expect, it, vi } from 'vitest';

vi.mock('electron', () => import('./fake-electron.ts'));

const { asReal, FakeContents, FakeSession } = await import('./fake-electron.ts');
const { guardContents, guardSession, isOurs } = await import('../../../main/desktop/guards.ts');

describe('a page', () => {
  it('cannot navigate, nor can a frame in it, be sent elsewhere, or attach another', () => {
    const contents = new FakeContents();
    guardContents(asReal.contents(contents));
    for (const name of [
      'will-navigate',
      'will-frame-navigate',
      'will-redirect',
      'will-attach-webview',
    ]) {
      const event = { preventDefault: vi.fn() };
      contents.emit(name, event);
      expect(event.preventDefault, name).toHaveBeenCalledOnce();
    }
  });

  it('cannot open a window', () => {
    const contents = new FakeContents();
    guardContents(asReal.contents(contents));
    // the handler looks at nothing: it denies whatever it is asked
    expect(contents.windowOpen?.call(null, Object.create(null))).toEqual({ action: 'deny' });
  });
});

describe('permissions', () => {
  const session = new FakeSession();
  guardSession(asReal.session(session));
  const [request] = session.setPermissionRequestHandler.mock.calls[0] ?? [];
  const [check] = session.setPermissionCheckHandler.mock.calls[0] ?? [];
  const [device] = session.setDevicePermissionHandler.mock.calls[0] ?? [];
  const contents = asReal.contents(new FakeContents());

  type Permission = Parameters<NonNullable<typeof request>>[1];

  function asked(permission: Permission, requestingUrl: string, isMainFrame = true): boolean {
    const decide = vi.fn((_isGranted: boolean) => {});
    request?.(contents, permission, decide, { requestingUrl, isMainFrame });
    return decide.mock.calls[0]?.[0] ?? true;
  }

  it.each<Permission>([
    'media',
    'geolocation',
    'notifications',
    'clipboard-read',
    'fileSystem',
    'openExternal',
    'usb',
    'fullscreen',
    'unknown',
  ])('%s is denied to our own page too', (permission) => {
    expect(asked(permission, 'monobis://app/index.html')).toBe(false);
  });

  it('only text to the clipboard is granted, to the main frame of our own page', () => {
    const write = 'clipboard-sanitized-write';
    expect(asked(write, 'monobis://app/index.html')).toBe(true);
    expect(asked(write, 'monobis://app/index.html', false)).toBe(false);
    expect(asked(write, 'monobis://report/1')).toBe(false);
    expect(asked(write, 'https://example.org/')).toBe(false);
    expect(check?.(contents, write, 'monobis://app/', { isMainFrame: true })).toBe(true);
    expect(check?.(contents, write, 'https://example.org/', { isMainFrame: true })).toBe(false);
    expect(check?.(contents, 'media', 'monobis://app/', { isMainFrame: true })).toBe(false);
  });

  it('no device and no download is allowed', () => {
    expect(device?.call(null, Object.create(null))).toBe(false);
    const event = { preventDefault: vi.fn() };
    session.emit('will-download', event);
    expect(event.preventDefault).toHaveBeenCalledOnce();
  });
});

describe('a message', () => {
  it('is ours from the main frame of our own page only', () => {
    expect(isOurs(asReal.frame({ url: 'monobis://app/index.html', parent: null }))).toBe(true);
  });

  it.each([
    ['another origin', { url: 'https://example.org/', parent: null }],
    ['a look-alike', { url: 'monobis://app.evil/index.html', parent: null }],
    ['a name before the host', { url: 'monobis://app@evil/index.html', parent: null }],
    ['a port', { url: 'monobis://app:80/index.html', parent: null }],
    ['a report', { url: 'monobis://report/1', parent: null }],
    ['a frame within', { url: 'monobis://app/index.html', parent: {} }],
    ['no address', { url: '', parent: null }],
    ['no frame', null],
  ])('is not ours from %s', (_, frame) => {
    expect(isOurs(asReal.frame(frame))).toBe(false);
  });
});
