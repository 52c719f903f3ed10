export type Cluster = {
  superUrl: string;
  ownerUrl: string;
  appUrl: string;
  gateUrl: string;
  pid: number;
  exited: Promise<string>;
  stop: (how?: 'fast' | 'immediate') => Promise<void>;
};
export function startCluster(options?: { name?: string; unsafe?: boolean }): Promise<Cluster>;
export function clusterFolder(name: string): string;
