/** A mail as it arrived at the local SMTP fake. */
export type Mail = {
  to: string[];
  from: string;
  subject: string;
  text: string;
  html: string | null;
  /** When it arrived, ISO 8601 in UTC. */
  at: string;
};
