import { mkdir, mkdtemp, rm, symlink, writeFile } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { contentSecurityPolicy } from '../../../main/desktop/policy.mjs';
import { appFile, registerScheme, serveApp } from '../../../main/desktop/protocol.ts';
import { FakeProtocol } from './fake-electron.ts';

let folder = '';
beforeAll(async () => {
  folder = await mkdtemp(path.join(tmpdir(), 'monobis-protocol-'));
  await mkdir(path.join(folder, 'built/assets'), { recursive: true });
  await mkdir(path.join(folder, 'built-beside'));
  await writeFile(path.join(folder, 'secret.csv'), 'secret');
  await writeFile(path.join(folder, 'built-beside/secret.csv'), 'secret');
  await writeFile(path.join(folder, 'built/index.html'), '<!doctype html>');
  await writeFile(path.join(folder, 'built/assets/app.js'), '0');
  await symlink(path.join(folder, 'secret.csv'), path.join(folder, 'built/link.js'));
});
afterAll(() => rm(folder, { recursive: true, force: true }));

const asked = (url: string, method = 'GET') => appFile({ url, method }, path.join(folder, 'built'));

describe("the app's own protocol", () => {
  it('is a secure, standard origin with fetch, that bypasses no policy', () => {
    const protocol = new FakeProtocol();
    registerScheme(protocol);
    expect(protocol.schemes).toEqual([
      {
        scheme: 'monobis',
        privileges: { standard: true, secure: true, supportFetchAPI: true, codeCache: true },
      },
    ]);
  });

  it('serves built files with their type and the policy', async () => {
    const page = await asked('monobis://app/index.html');
    expect(page.status).toBe(200);
    expect(page.headers.get('content-security-policy')).toBe(contentSecurityPolicy);
    expect(page.headers.get('content-type')).toBe('text/html; charset=utf-8');
    expect(page.headers.get('x-content-type-options')).toBe('nosniff');
    const script = await asked('monobis://app/assets/app.js?v=1#x');
    expect(script.headers.get('content-type')).toBe('text/javascript; charset=utf-8');
    expect(await script.text()).toBe('0');
  });

  it('is where Electron is told to find it', async () => {
    const protocol = new FakeProtocol();
    serveApp(protocol, path.join(folder, 'built'));
    const answer = await protocol.handlers.get('monobis')?.(new Request('monobis://app/'));
    expect(answer?.status).toBe(200);
  });

  it.each([
    'monobis://app/../secret.csv',
    'monobis://app/%2e%2e/secret.csv',
    'monobis://app/..%2fsecret.csv',
    'monobis://app/assets/..%2f..%2f..%2fsecret.csv',
    'monobis://app/..%2fbuilt-beside%2fsecret.csv',
    'monobis://app/%2e%2e%5csecret.csv',
    'monobis://app//etc/passwd',
    'monobis://app/link.js',
    'monobis://app/%00',
    'monobis://app/%E0%A4%A',
    'monobis://other/index.html',
    'monobis://report/index.html',
    'monobis://app/assets',
    'monobis://app/assets/',
  ])('has nothing at %s', async (address) => {
    expect((await asked(address)).status).toBe(404);
  });

  it('answers GET only', async () => {
    expect((await asked('monobis://app/index.html', 'POST')).status).toBe(404);
  });
});

it('the policy begins from nothing and allows nothing inline, no evaluation and no other host', () => {
  expect(contentSecurityPolicy).toBe(
    "default-src 'none'; script-src 'self'; style-src 'self'; img-src 'self' data: blob:; " +
      "font-src 'self'; worker-src 'self'; connect-src 'self'; base-uri 'none'; " +
      "form-action 'none'; frame-ancestors 'none'",
  );
});
