import 'express-session';

declare module 'express-session' {
  interface SessionData {
    /** Token that changes have to carry. */
    csrfToken: string;
    /** Workshop that the session works in. */
    workshopId: string;
  }
}

declare global {
  namespace Express {
    // Passport keeps only the id; who that is gets loaded for each request.
    interface User {
      id: string;
    }
  }
}
