export interface RunningPostgres {
  /** Connection string of the product's database. */
  url: string;
  /** Connection string of the maintenance database, for making others. */
  adminUrl: string;
  stop(): Promise<void>;
}
export function ensurePostgres(options: {
  dataDir: string;
  log?: (line: string) => void;
}): Promise<RunningPostgres>;
export function installPackages(packages: string[], log: (line: string) => void): void;
