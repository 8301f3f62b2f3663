import type { TestProject } from 'vitest/node';

import { makeTestCluster } from './make-test-cluster.js';

/** One cluster for the whole run; each test file clones its databases from the template. */
export default async function setup(project: TestProject): Promise<() => Promise<void>> {
  const { remove, ...cluster } = await makeTestCluster();
  project.provide('cluster', cluster);
  return remove;
}
