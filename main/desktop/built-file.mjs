import { realpath, stat } from 'node:fs/promises';
import path from 'node:path';

/**
 * The file of the built app that a URL path names, or null: nothing outside `folder` is ever
 * served, however the path is written (encoded, with "..", through a link).
 *
 * @param {string} folder the built renderer
 * @param {string} urlPath the path of the request, still encoded
 * @returns {Promise<string | null>}
 */
export async function builtFile(folder, urlPath) {
  let decoded;
  try {
    decoded = decodeURIComponent(urlPath);
  } catch {
    return null;
  }
  if (decoded.includes('\0') || decoded.includes('\\')) return null;
  const wanted = path.join(folder, decoded === '/' ? 'index.html' : decoded);
  try {
    const [root, real] = await Promise.all([realpath(folder), realpath(wanted)]);
    if (!real.startsWith(root + path.sep)) return null;
    return (await stat(real)).isFile() ? real : null;
  } catch {
    return null;
  }
}
