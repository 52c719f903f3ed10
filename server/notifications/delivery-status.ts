/** What a mail server says later about a mail that it took (RFC 3464), as far as it matters here. */
export type DeliveryStatus = {
  /** The id of the mail that came back, without its angle brackets. */
  messageId: string;
  /** The receivers that it could not be given to, as addressed and as finally tried, in lower case. */
  failed: { addresses: string[]; isPermanent: boolean }[];
};

type Part = { fields: Map<string, string>; body: string };

/** Fields of a head, by name in lower case; a line that begins with white space goes on with the one before. */
const fieldsOf = (head: string): Map<string, string> => {
  const fields = new Map<string, string>();
  for (const line of head.replace(/\n[ \t]+/g, ' ').split('\n')) {
    const colon = line.indexOf(':');
    const name = line.slice(0, Math.max(colon, 0)).trim().toLowerCase();
    if (name && !fields.has(name)) fields.set(name, line.slice(colon + 1).trim());
  }
  return fields;
};

const partOf = (text: string): Part => {
  const end = text.indexOf('\n\n');
  return end < 0
    ? { fields: fieldsOf(text), body: '' }
    : { fields: fieldsOf(text.slice(0, end)), body: text.slice(end + 2) };
};

const typeOf = ({ fields }: Part): string =>
  (fields.get('content-type') ?? '').split(';')[0]?.trim().toLowerCase() ?? '';

const partsOf = (report: Part): Part[] => {
  const given = /boundary\s*=\s*(?:"([^"]+)"|([^\s;]+))/i.exec(report.fields.get('content-type') ?? '');
  const boundary = given?.[1] ?? given?.[2];
  if (!boundary) return [];
  return `\n${report.body}`
    .split(`\n--${boundary}`)
    .slice(1)
    .filter((text) => !text.startsWith('--'))
    .map((text) => partOf(text.slice(text.indexOf('\n') + 1)));
};

/** As in `rfc822;somebody@people.example`. */
const addressOf = (field: string | undefined): string[] => {
  const address = field?.split(';').slice(1).join(';').trim().toLowerCase();
  return address ? [address] : [];
};

const failuresIn = (body: string): DeliveryStatus['failed'] =>
  body
    .split(/\n\s*\n/)
    .map(fieldsOf)
    .filter((fields) => /^failed\b/i.test(fields.get('action') ?? ''))
    .map((fields) => ({
      addresses: [
        ...addressOf(fields.get('original-recipient')),
        ...addressOf(fields.get('final-recipient')),
      ],
      isPermanent: (fields.get('status') ?? '').startsWith('5.'),
    }));

/** Reads a report; null where it is none, names no mail, or says that nothing has failed. */
export const readDeliveryStatus = (text: string): DeliveryStatus | null => {
  const report = partOf(text.replaceAll('\r\n', '\n'));
  const parts = partsOf(report);
  const status = parts.find((part) => typeOf(part) === 'message/delivery-status');
  const returned = parts.find((part) => ['message/rfc822', 'text/rfc822-headers'].includes(typeOf(part)));
  if (!status || !returned) return null;
  const failed = failuresIn(status.body);
  const messageId = /<([^<>\s]+)>/.exec(partOf(returned.body).fields.get('message-id') ?? '')?.[1];
  return messageId && failed.length > 0 ? { messageId, failed } : null;
};
