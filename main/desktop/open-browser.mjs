import { spawn } from 'node:child_process';

/**
 * Opens an address in the default browser. A machine without one is no failure: the address stands
 * on the terminal.
 *
 * @param {string} address
 * @param {NodeJS.Platform} platform
 */
export function openBrowser(address, platform = process.platform) {
  const [command, ...args] =
    platform === 'darwin'
      ? ['open', address]
      : platform === 'win32'
        ? ['cmd', '/c', 'start', '', address]
        : ['xdg-open', address];
  const child = spawn(command, args, { stdio: 'ignore', detached: true });
  child.once('error', () => {});
  child.unref();
}
