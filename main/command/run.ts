import { parseArgs } from 'node:util';
import { Refusal, refusalSentence } from '../../analysis/index.ts';
import { type ExitCode, exitCodes } from './exit-codes.ts';
import { quantifyCommand } from './quantify.ts';
import { quantifyEachCommand } from './quantify-each.ts';
import { readCommand } from './read.ts';
import { reportCommand } from './report.ts';
import type { Streams } from './streams.ts';
import { usage, version } from './usage.ts';

/** One call of the command line. Never throws: what a user can mend is 2, a fault is 1. */
export async function run(args: readonly string[], streams: Streams): Promise<ExitCode> {
  try {
    return await dispatch(args, streams);
  } catch (error) {
    if (error instanceof Refusal) {
      streams.say(refusalSentence(error.toText()));
      return exitCodes.inputUnusable;
    }
    streams.say(`A fault in the program, not in your files: ${faultText(error)}`);
    return exitCodes.fault;
  }
}

async function dispatch(args: readonly string[], streams: Streams): Promise<ExitCode> {
  const { values, positionals } = parsed(args);
  if (values.version === true) {
    await streams.result(`${version}\n`);
    return exitCodes.done;
  }
  const [verb, ...rest] = positionals;
  if (values.help === true || verb === 'help') {
    await streams.result(usage);
    return exitCodes.done;
  }
  const json = values.json === true;
  if (verb === 'read') {
    if (rest.length === 0) throw wrongCall('"read" needs the name of at least one export.');
    return readCommand({ files: rest, json }, streams);
  }
  if (verb === 'quantify') {
    const [sheet, ...files] = rest;
    if (sheet === undefined) throw wrongCall('"quantify" needs the name of a sheet.');
    if (values.each !== true) {
      if (files.length > 0) throw wrongCall('"quantify" takes one sheet; files go after --each.');
      return quantifyCommand({ sheet, json }, streams);
    }
    if (files.length === 0) throw wrongCall('"--each" needs at least one file.');
    return quantifyEachCommand({ sheet, files, json }, streams);
  }
  if (verb === 'report') {
    const [sheet, ...more] = rest;
    if (sheet === undefined || more.length > 0) throw wrongCall('"report" takes one sheet.');
    if (values.to === undefined) throw wrongCall('"report" needs --to with the file to write.');
    return reportCommand({ sheet, to: values.to, json }, streams);
  }
  throw wrongCall(verb === undefined ? 'No command was given.' : `"${verb}" is not a command.`);
}

function parsed(args: readonly string[]) {
  try {
    return parseArgs({
      args: [...args],
      allowPositionals: true,
      strict: true,
      options: {
        json: { type: 'boolean' },
        each: { type: 'boolean' },
        to: { type: 'string' },
        help: { type: 'boolean', short: 'h' },
        version: { type: 'boolean' },
      },
    });
  } catch (error) {
    throw wrongCall(
      error instanceof Error ? `${error.message.split('. ')[0]}.` : 'Unknown option.',
    );
  }
}

function wrongCall(message: string): Refusal {
  return new Refusal({ code: 'wrong-call', message, mend: `\n${usage}` });
}

function faultText(error: unknown): string {
  return error instanceof Error ? `${error.name}: ${error.message}` : String(error);
}
