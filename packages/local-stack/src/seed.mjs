import { makeDemo } from './make-demo.mjs';
import { openForProgram } from './open-for-program.mjs';
import { say } from './root.mjs';
import { runCommand } from './run-command.mjs';

runCommand(async () => {
  const env = await openForProgram('npm run seed');
  const { signIns } = await makeDemo(env.seed, process.argv.slice(2));
  say(signIns);
  return 0;
});
