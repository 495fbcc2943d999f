export interface Cluster {
  readonly url: string;
  databaseUrl(database: string): string;
  stop(): Promise<void>;
}
export function startPostgres(name: string, options?: { temporary?: boolean }): Promise<Cluster>;
export function temporaryClusterName(purpose: string): string;
export function ensureDatabase(cluster: Cluster, name: string): Promise<string>;
