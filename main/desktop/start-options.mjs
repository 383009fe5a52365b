import path from 'node:path';
import { parseArgs } from 'node:util';

const usage =
  'npm start -- [--browser] [--no-open] [--port N] [SHEET]: --browser does without the desktop runtime, --no-open serves but opens nothing, --port N serves there.';

/**
 * What `npm start` was asked for, or in words why it cannot be done.
 *
 * @param {readonly string[]} args after `--`
 * @param {Readonly<Record<string, string | undefined>>} env PORT, and npm's INIT_CWD
 */
export function startOptions(args, env) {
  let parsed;
  try {
    parsed = parseArgs({
      args: [...args],
      allowPositionals: true,
      options: {
        browser: { type: 'boolean', default: false },
        'no-open': { type: 'boolean', default: false },
        port: { type: 'string' },
      },
    });
  } catch (error) {
    const [what] = error.message.split('. ');
    return { ok: false, message: `${what}.\n${usage}` };
  }
  const { values, positionals } = parsed;
  const asked = values.port ?? env.PORT;
  const port = asked === undefined || asked === '' ? null : Number(asked);
  if (port !== null && !(Number.isInteger(port) && port >= 0 && port <= 65535)) {
    return { ok: false, message: `"${asked}" is not a port: a whole number from 0 to 65535 is.` };
  }
  // npm runs scripts in the folder of the package; paths are meant from where npm was called
  const from = env.INIT_CWD ?? process.cwd();
  return {
    ok: true,
    isBrowserAsked: values.browser,
    opensBrowser: !values['no-open'],
    port,
    sheets: positionals.map((file) => path.resolve(from, file)),
  };
}
