import type { Cluster } from './postgres.mjs';

export type DemoStack = {
  readonly address: string;
  readonly password: string;
  /** The database as its superuser, to see what it holds. */
  readonly superUrl: string;
  output(): string;
  stop(): Promise<void>;
};
export function startDemoStack(given: { cluster: Cluster; database: string }): Promise<DemoStack>;
