export { canReach, databaseUser } from './postgres/database-user.mjs';
export { findOrInstallPostgres, findPostgres } from './postgres/find.mjs';
export { isMade, makeCluster } from './postgres/make-cluster.mjs';
export { databaseUrls, makePasswords, ROLES, SUPERUSER } from './postgres/roles.mjs';
export { runCluster } from './postgres/run-cluster.mjs';
export { freePort, isFree } from './processes/free-port.mjs';
