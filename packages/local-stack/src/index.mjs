export { databaseUser } from './postgres/database-user.mjs';
export { findOrInstallPostgres } from './postgres/find.mjs';
export { makeCluster } from './postgres/make-cluster.mjs';
export { databaseUrls, makePasswords } from './postgres/roles.mjs';
export { runCluster } from './postgres/run-cluster.mjs';
export { freePort, isFree } from './processes/free-port.mjs';
