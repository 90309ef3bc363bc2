/** The command line's entry: exit codes are 0 done, 1 not agreed, 2 bad input, 3 infeasible or illegal, 4 nothing found. */
import { printPinPrice } from './command-line/pin-price';
import { place } from './command-line/place';
import { prove } from './command-line/prove';
import { usage } from './command-line/usage';
import { verify } from './command-line/verify';
import { model, modelUsage } from './pinloom-model';
import { qap, qapUsage } from './pinloom-qap';

export type ExitCode = 0 | 1 | 2 | 3 | 4;

const allUsage = `${usage}${modelUsage}${qapUsage}`;

async function run(args: readonly string[]): Promise<ExitCode> {
  const [command, ...rest] = args;
  if (command === 'place') return place(rest);
  if (command === 'pin-price') return printPinPrice(rest);
  if (command === 'verify') return verify(rest);
  if (command === 'prove') return prove(rest);
  if (command === 'model') return model(rest);
  if (command === 'qap') return qap(rest);
  const wantsHelp = command === undefined || command === '--help' || command === '-h' || command === 'help';
  (command !== undefined && wantsHelp ? process.stdout : process.stderr).write(
    wantsHelp ? allUsage : `There is no command ${command}.\n\n${allUsage}`,
  );
  return command !== undefined && wantsHelp ? 0 : 2;
}

process.exitCode = await run(process.argv.slice(2));
