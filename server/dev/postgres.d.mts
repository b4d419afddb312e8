export type Cluster = {
  /** Where the cluster lies, with its secrets. */
  readonly folder: string;
  readonly secrets: Secrets;
  readonly port: number;
  superUrl(database: string): string;
  ownerUrl(database: string): string;
  appUrl(database: string): string;
  stop(): void;
  destroy(): void;
};
export type Secrets = {
  readonly superuser: string;
  readonly owner: string;
  readonly application: string;
  readonly session: string;
  readonly demo: string;
};
export function ensurePostgres(): string;
export function startCluster(given: { kind: 'product' | 'test' }): Promise<Cluster>;
export function ensureDatabase(cluster: Cluster, name: string): Promise<{ made: boolean }>;
/** Drops a database, whoever is still connected to it. */
export function dropDatabase(cluster: Cluster, name: string): Promise<void>;
