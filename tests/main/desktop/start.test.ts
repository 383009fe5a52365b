import { mkdir, mkdtemp, rm, writeFile } from 'node:fs/promises';
import { request } from 'node:http';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { serveLoopback } from '../../../main/desktop/loopback.mjs';
import { electronRuntime, fetchRuntime } from '../../../main/desktop/runtime.mjs';

let folder = '';
beforeAll(async () => {
  folder = await mkdtemp(path.join(tmpdir(), 'monobis-start-'));
  await mkdir(path.join(folder, 'built'));
  await writeFile(path.join(folder, 'built/index.html'), '<!doctype html>');
  await writeFile(path.join(folder, 'outside.txt'), 'outside');
});
afterAll(() => rm(folder, { recursive: true, force: true }));

function asked(
  address: string,
  options: { path?: string; method?: string; host?: string },
): Promise<{ status: number; headers: Record<string, unknown> }> {
  const { port } = new URL(address);
  return new Promise((resolve, reject) => {
    const call = request(
      {
        host: '127.0.0.1',
        port,
        path: options.path ?? '/',
        method: options.method ?? 'GET',
        headers: { host: options.host ?? `127.0.0.1:${port}` },
      },
      (response) => {
        response.resume();
        response.on('end', () =>
          resolve({ status: response.statusCode ?? 0, headers: response.headers }),
        );
      },
    );
    call.on('error', reject);
    call.end();
  });
}

describe('the loopback server', () => {
  it('serves the app with its policy, and only by its own host, by GET and HEAD, and nothing outside', async () => {
    const server = await serveLoopback({ folder: path.join(folder, 'built') });
    try {
      const good = await asked(server.address, {});
      expect(good.status).toBe(200);
      expect(good.headers['content-security-policy']).toContain("frame-ancestors 'none'");
      expect(good.headers['x-content-type-options']).toBe('nosniff');
      expect((await asked(server.address, { method: 'HEAD' })).status).toBe(200);
      expect((await asked(server.address, { host: 'evil.example:80' })).status).toBe(421);
      expect((await asked(server.address, { method: 'POST' })).status).toBe(405);
      for (const outside of [
        '/../outside.txt',
        '/%2e%2e/outside.txt',
        '/..%2foutside.txt',
        '/%00',
        '/nothing',
      ]) {
        expect((await asked(server.address, { path: outside })).status, outside).toBe(404);
      }
    } finally {
      await server.close();
    }
  });

  it('listens on this machine only', async () => {
    const server = await serveLoopback({ folder: path.join(folder, 'built') });
    expect(server.address).toMatch(/^http:\/\/127\.0\.0\.1:\d+\/$/);
    await server.close();
  });
});

describe("Electron's runtime", () => {
  it('is found by its files, without loading the package', async () => {
    expect(electronRuntime(folder, {})).toBeNull();
    await mkdir(path.join(folder, 'node_modules/electron/dist'), { recursive: true });
    await writeFile(path.join(folder, 'node_modules/electron/path.txt'), 'electron');
    // named, but not there
    expect(electronRuntime(folder, {})).toBeNull();
    await writeFile(path.join(folder, 'node_modules/electron/dist/electron'), '');
    expect(electronRuntime(folder, {})).toBe(
      path.join(folder, 'node_modules/electron/dist/electron'),
    );
  });

  it('is taken from where the environment says', () => {
    expect(
      electronRuntime(folder, { ELECTRON_OVERRIDE_DIST_PATH: path.join(folder, 'nowhere') }),
    ).toBeNull();
  });

  it('is given up when its script fails', async () => {
    const other = path.join(folder, 'other');
    await mkdir(path.join(other, 'node_modules/electron'), { recursive: true });
    expect(await fetchRuntime(other, 1000)).toBe(false);
    await writeFile(path.join(other, 'node_modules/electron/install.js'), 'process.exit(1)');
    expect(await fetchRuntime(other, 10_000)).toBe(false);
  });
});
