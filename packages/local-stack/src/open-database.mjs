import { rmSync } from 'node:fs';

import { findOrInstallPostgres } from './postgres/find.mjs';
import { isMade, makeCluster } from './postgres/make-cluster.mjs';
import { runCluster } from './postgres/run-cluster.mjs';
import { say } from './root.mjs';
import { clusterFolder, ELSEWHERE } from './state/folders.mjs';
import { forgetHouse, keptHouse } from './state/house.mjs';
import { secrets } from './state/secrets.mjs';

/** This clone's own database, made where there is none yet. The state must have been taken. */
export async function openDatabase() {
  const bin = await findOrInstallPostgres(say);
  const folder = clusterFolder();
  if (keptHouse()?.isReady === false) {
    rmSync(folder, { recursive: true, force: true });
    forgetHouse();
  }
  if (!isMade(folder)) {
    say(
      folder.startsWith(ELSEWHERE)
        ? `Making the database under ${ELSEWHERE}, since its user cannot get into this folder.`
        : 'Making the database.',
    );
    await makeCluster({ bin, folder, passwords: secrets().passwords });
  }
  return runCluster({ bin, folder });
}
