import { describe, expect, it, vi } from 'vitest';

vi.mock('electron', () => import('./fake-electron.ts'));

const { lastWindow, session } = await import('./fake-electron.ts');
const { printToPdf } = await import('../../../main/desktop/pdf.ts');

const reports = session.fromPartition('report');

/** Asks the session of reports as Chromium would: may it, and what is there. */
async function loaded(url: string): Promise<string | null> {
  const [mayLoad] = reports.webRequest.onBeforeRequest.mock.calls[0] ?? [];
  const decide = vi.fn((_answer: object) => {});
  mayLoad?.({ url }, decide);
  expect(decide).toHaveBeenCalledOnce();
  if (JSON.stringify(decide.mock.calls[0]?.[0]) !== '{"cancel":false}') return null;
  const handler = reports.protocol.handlers.get('monobis');
  const answer = await handler?.(new Request(url));
  return answer?.status === 200 ? answer.text() : null;
}

describe('a report', () => {
  it('is printed in a window without script, preload or Node, in a session of its own, and gone after', async () => {
    const pdf = await printToPdf('<p>report</p>');
    expect(new TextDecoder().decode(pdf)).toContain('%PDF');
    const window = lastWindow();
    expect(window.options.webPreferences).toEqual({
      sandbox: true,
      contextIsolation: true,
      nodeIntegration: false,
      javascript: false,
      webSecurity: true,
      session: reports,
    });
    expect(window.options.show).toBe(false);
    expect(window.destroy).toHaveBeenCalledOnce();
    expect(reports.setPermissionRequestHandler).toHaveBeenCalled();
  });

  it('may be larger than an address can be, and is there only while it is printed', async () => {
    const html = `<p>${'µ'.repeat(3_000_000)}</p>`;
    const done = printToPdf(html);
    const window = lastWindow();
    const [address = ''] = window.loadURL.mock.calls[0] ?? [];
    expect(address).toMatch(/^monobis:\/\/report\/[\da-f-]{36}$/);
    expect(await loaded(address)).toBe(html);
    await done;
    expect(await loaded(address)).toBeNull();
  });

  it('loads nothing from anywhere', async () => {
    await printToPdf('<img src="https://example.org/x.png">');
    for (const url of [
      'https://example.org/x.png',
      'file:///etc/passwd',
      'monobis://app/index.html',
      'monobis://report/guessed',
    ]) {
      expect(await loaded(url), url).toBeNull();
    }
  });

  it('leaves no window behind where printing fails', async () => {
    const done = printToPdf('<p>');
    lastWindow().webContents.printToPDF.mockRejectedValueOnce(new Error('no printer'));
    await expect(done).rejects.toThrow('no printer');
    expect(lastWindow().destroy).toHaveBeenCalledOnce();
  });
});
