const entities: Record<string, string> = { amp: '&', lt: '<', gt: '>', quot: '"', apos: "'" };

const unescapeXml = (text: string): string =>
  text.replaceAll(/&(amp|lt|gt|quot|apos);/g, (_whole, name: string) => entities[name] ?? '');

/** What a TwiML document says, and where it sends a key that is pressed. */
export function readTwiml(twiml: string): { spoken: string[]; keysUrl: string } {
  const spoken = [...twiml.matchAll(/<Say\b[^>]*>([^<]*)<\/Say>/g)].map(([, text]) =>
    unescapeXml(text ?? ''),
  );
  const [, keysUrl = ''] = /<Gather\b[^>]*\baction="([^"]*)"/.exec(twiml) ?? [];
  return { spoken, keysUrl: unescapeXml(keysUrl) };
}
