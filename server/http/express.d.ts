import {type Caller} from '../caller';

declare global {
  namespace Express {
    // Passport puts the caller here.
    interface User extends Caller {
      readonly personId: string;
    }
  }
}

declare module 'express-session' {
  interface SessionData {
    /** Echoed by our own pages with every writing call. */
    forgeryToken: string;
  }
}
