/** What the tabs of one browser tell each other. Ids only: any tab of this origin can read it. */
export type TabNews = { kind: 'signed-in'; personId: string } | { kind: 'signed-out' };

const channelName = 'espalier-session';

/** Tells the other tabs; this one does not hear it. */
export function tellOtherTabs(news: TabNews): void {
  const channel = new BroadcastChannel(channelName);
  channel.postMessage(news);
  channel.close();
}

/** Returns the function that ends the listening. */
export function listenToOtherTabs(listener: (news: TabNews) => void): () => void {
  const channel = new BroadcastChannel(channelName);
  channel.onmessage = ({ data }: MessageEvent<TabNews>) => listener(data);
  return () => channel.close();
}
