export function joinTestCluster(): Promise<{ superUrl: string; leave: () => Promise<void> }>;
