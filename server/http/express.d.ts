import type { SignedIn } from './sessions.ts';

// Passport leaves the shape of `req.user` to the application by declaration merging.
declare global {
  namespace Express {
    interface User {
      clinicId: string;
      personId: string;
      /** Missing between the password check and the start of the session, and once the session is over. */
      session?: SignedIn;
    }
  }
}
