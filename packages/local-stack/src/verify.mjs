import { runApiProgram } from './run-api-program.mjs';
import { runCommand } from './run-command.mjs';

runCommand(() => runApiProgram('verify'));
