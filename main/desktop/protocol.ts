import { readFile } from 'node:fs/promises';
import path from 'node:path';
import type { Protocol } from 'electron';
import { builtFile } from './built-file.mjs';
import { headersFor } from './policy.mjs';

export const scheme = 'monobis';

/** Where a report is printed from: never the origin of the app. */
export const reportOrigin = `${scheme}://report`;

/** Before the app is ready: our scheme is a secure, standard origin with fetch and workers. */
export function registerScheme(protocol: Pick<Protocol, 'registerSchemesAsPrivileged'>): void {
  protocol.registerSchemesAsPrivileged([
    {
      scheme,
      privileges: { standard: true, secure: true, supportFetchAPI: true, codeCache: true },
    },
  ]);
}

/** Serves the built renderer, and nothing else, under monobis://app/. */
export function serveApp(protocol: Pick<Protocol, 'handle'>, folder: string): void {
  protocol.handle(scheme, (request) => appFile(request, folder));
}

export async function appFile(
  request: Pick<Request, 'url' | 'method'>,
  folder: string,
): Promise<Response> {
  const url = new URL(request.url);
  if (url.host !== 'app' || request.method !== 'GET') return new Response(null, { status: 404 });
  const file = await builtFile(folder, url.pathname);
  if (file === null) return new Response(null, { status: 404 });
  const bytes = await readFile(file);
  return new Response(new Uint8Array(bytes), { headers: headersFor(path.extname(file)) });
}
