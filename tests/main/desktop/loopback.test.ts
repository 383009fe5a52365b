import { mkdir, mkdtemp, rm, symlink, writeFile } from 'node:fs/promises';
import { type IncomingHttpHeaders, request } from 'node:http';
import { connect } from 'node:net';
import { networkInterfaces, tmpdir } from 'node:os';
import path from 'node:path';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { serveLoopback } from '../../../main/desktop/loopback.mjs';
import { contentSecurityPolicy } from '../../../main/desktop/policy.mjs';

let folder = '';
let server: Awaited<ReturnType<typeof serveLoopback>>;
beforeAll(async () => {
  folder = await mkdtemp(path.join(tmpdir(), 'monobis-loopback-'));
  await mkdir(path.join(folder, 'built/assets'), { recursive: true });
  await writeFile(path.join(folder, 'built/index.html'), '<!doctype html>');
  await writeFile(path.join(folder, 'outside.txt'), 'outside');
  await symlink(path.join(folder, 'outside.txt'), path.join(folder, 'built/link.txt'));
  server = await serveLoopback({ folder: path.join(folder, 'built') });
});
afterAll(async () => {
  await server.close();
  await rm(folder, { recursive: true, force: true });
});

interface Asked {
  readonly path?: string;
  readonly method?: string;
  readonly host?: string;
}

interface Answered {
  readonly status: number;
  readonly headers: IncomingHttpHeaders;
  readonly body: string;
}

const port = () => new URL(server.address).port;

function asked(options: Asked = {}): Promise<Answered> {
  return new Promise((resolve, reject) => {
    const call = request(
      {
        host: '127.0.0.1',
        port: port(),
        path: options.path ?? '/',
        method: options.method ?? 'GET',
        headers: { host: options.host ?? `127.0.0.1:${port()}` },
      },
      (response) => {
        let body = '';
        response.on('data', (part) => {
          body += String(part);
        });
        response.on('end', () =>
          resolve({ status: response.statusCode ?? 0, headers: response.headers, body }),
        );
      },
    );
    call.on('error', reject);
    call.end();
  });
}

describe('the loopback server', () => {
  it('serves the app with its policy', async () => {
    const { status, headers, body } = await asked();
    expect(status).toBe(200);
    expect(body).toBe('<!doctype html>');
    expect(headers).toMatchObject({
      'content-type': 'text/html; charset=utf-8',
      'content-security-policy': contentSecurityPolicy,
      'x-content-type-options': 'nosniff',
      'referrer-policy': 'no-referrer',
      'cross-origin-resource-policy': 'same-origin',
    });
  });

  it('answers HEAD without a body, and no other method than that and GET', async () => {
    expect(await asked({ method: 'HEAD' })).toMatchObject({ status: 200, body: '' });
    for (const method of ['POST', 'PUT', 'DELETE', 'OPTIONS']) {
      const { status, headers } = await asked({ method });
      expect(status, method).toBe(405);
      expect(headers.allow).toBe('GET, HEAD');
    }
  });

  it('goes by its own names only, whatever a web page makes them resolve to', async () => {
    expect((await asked({ host: `localhost:${port()}` })).status).toBe(200);
    for (const host of [
      'evil.example',
      `evil.example:${port()}`,
      '127.0.0.1',
      '127.0.0.1:1',
      `127.0.0.1:${port()}.evil.example`,
    ]) {
      const { status, body } = await asked({ host });
      expect(status, host).toBe(421);
      expect(body).not.toContain('doctype');
    }
  });

  it.each([
    '/../outside.txt',
    '/%2e%2e/outside.txt',
    '/..%2foutside.txt',
    '/assets/..%2f..%2f..%2foutside.txt',
    '/..%5coutside.txt',
    '/link.txt',
    '/%00',
    '/%E0%A4%A',
    '/assets',
    '//etc/passwd',
    'http://evil.example/outside.txt',
    '/nothing',
  ])('has nothing at %s', async (outside) => {
    const { status, headers, body } = await asked({ path: outside });
    expect(status).toBe(404);
    expect(body).toBe('No such file.\n');
    expect(headers['x-content-type-options']).toBe('nosniff');
  });

  it('cannot be reached but from this machine', async () => {
    expect(server.address).toMatch(/^http:\/\/127\.0\.0\.1:\d+\/$/);
    const outer = Object.values(networkInterfaces())
      .flatMap((each) => each ?? [])
      .filter(({ internal, family }) => !internal && family === 'IPv4');
    for (const { address } of outer) {
      const reached = await new Promise((resolve) => {
        const socket = connect({ host: address, port: Number(port()) });
        socket.once('connect', () => resolve(true)).once('error', () => resolve(false));
        socket.once('connect', () => socket.destroy());
      });
      expect(reached, address).toBe(false);
    }
  });
});
