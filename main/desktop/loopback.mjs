import { createReadStream } from 'node:fs';
import { createServer } from 'node:http';
import path from 'node:path';
import { builtFile } from './built-file.mjs';
import { headersFor } from './policy.mjs';

/**
 * Serves the built app to this machine only: the fallback where the desktop runtime cannot be had,
 * and what the whole-app tests drive. The Host header is checked, so that no web page can reach it
 * by a name of its own (DNS rebinding); only built files; only GET and HEAD.
 *
 * @param {{ folder: string, port?: number }} options port 0 takes any free one
 * @returns {Promise<{ address: string, close: () => Promise<void> }>}
 */
export async function serveLoopback({ folder, port = 0 }) {
  const server = createServer((request, response) => {
    answer(folder, server.address().port, request, response).catch(() => {
      if (!response.headersSent) response.writeHead(500);
      response.end();
    });
  });
  await new Promise((resolve, reject) => {
    server.once('error', reject);
    server.listen(port, '127.0.0.1', resolve);
  });
  return {
    address: `http://127.0.0.1:${server.address().port}/`,
    close: () =>
      new Promise((resolve) => {
        server.close(() => resolve());
        server.closeAllConnections();
      }),
  };
}

async function answer(folder, port, request, response) {
  const refuse = (status, text) => {
    response.writeHead(status, {
      ...headersFor(''),
      'Content-Type': 'text/plain; charset=utf-8',
    });
    response.end(`${text}\n`);
  };
  const names = ['127.0.0.1', 'localhost'];
  // a browser leaves out the port that is http's own
  const hosts = port === 80 ? names : names.map((name) => `${name}:${port}`);
  if (!hosts.includes(request.headers.host))
    return refuse(421, 'Not the host that is served here.');
  if (request.method !== 'GET' && request.method !== 'HEAD') {
    response.setHeader('Allow', 'GET, HEAD');
    return refuse(405, 'Only GET and HEAD.');
  }
  const [urlPath] = request.url.split(/[?#]/);
  const file = await builtFile(folder, urlPath);
  if (file === null) return refuse(404, 'No such file.');
  response.writeHead(200, headersFor(path.extname(file)));
  if (request.method === 'HEAD') return response.end();
  const stream = createReadStream(file);
  stream.on('error', () => response.destroy());
  stream.pipe(response);
}
