export interface Cluster {
  url: string;
  port: number;
  dataDir: string;
  logPath: string;
  pid: number;
  startedHere: boolean;
}
export function ensureCluster(root: string, options?: { say?: (line: string) => void }): Promise<Cluster>;
export function stopCluster(cluster: Cluster): Promise<void>;
export function startThrowAwayCluster(options?: {
  say?: (line: string) => void;
}): Promise<Cluster & { stop: () => Promise<void> }>;
