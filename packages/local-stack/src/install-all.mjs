import { findOrInstallChromium } from './debian.mjs';
import { installPackages } from './install.mjs';
import { findOrInstallPostgres } from './postgres/find.mjs';
import { say } from './root.mjs';
import { runCommand } from './run-command.mjs';

runCommand(async () => {
  await findOrInstallPostgres(say);
  await findOrInstallChromium(say);
  await installPackages();
  return 0;
});
