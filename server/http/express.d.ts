import type { SignedIn } from './sessions.ts';

// Passport leaves the shape of `req.user` to the application by declaration merging.
declare global {
  namespace Express {
    interface User {
      clinicId: string;
      personId: string;
      /** Missing only between the password check and the start of the session. */
      session?: SignedIn;
    }
  }
}
