import { build } from './build.mjs';
import { installPackages } from './install.mjs';
import { runCommand } from './run-command.mjs';

runCommand(async () => {
  await installPackages();
  await build();
  return 0;
});
