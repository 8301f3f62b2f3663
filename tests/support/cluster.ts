import type { databaseUrls } from '@foldwell/local-stack';

export type Urls = ReturnType<typeof databaseUrls>;

/** The throw-away cluster of one test run: the template that test databases are cloned from. */
export interface TestCluster {
  port: number;
  passwords: Urls;
  template: string;
}

declare module 'vitest' {
  export interface ProvidedContext {
    cluster: TestCluster;
  }
}
