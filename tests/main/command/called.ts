import { run } from '../../../main/command/run.ts';

export interface Called {
  readonly code: number;
  readonly out: string;
  readonly err: string;
}

/** One call of the command line, in this process, with its streams caught. */
export async function called(...args: string[]): Promise<Called> {
  let out = '';
  let err = '';
  const code = await run(args, {
    result: async (text) => {
      out += text;
    },
    say: (line) => {
      err += `${line}\n`;
    },
  });
  return { code, out, err };
}
