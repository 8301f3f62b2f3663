import { openForProgram } from './open-for-program.mjs';
import { startProcess } from './processes/process.mjs';
import { programArgs } from './programs.mjs';
import { runCommand } from './run-command.mjs';

runCommand(async () => {
  const env = await openForProgram('npm run verify');
  const args = [...programArgs('verify'), ...process.argv.slice(2)];
  const { ended } = startProcess(process.execPath, args, { env: env.verify, stdio: 'inherit' });
  return (await ended) ?? 1;
});
