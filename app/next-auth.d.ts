import 'next-auth';
import 'next-auth/jwt';

declare module 'next-auth' {
  interface User {
    id: string;
    name: string;
    email: string;
    sessionId: string;
  }
  interface Session {
    user: { id: string; name: string; email: string };
  }
}

declare module 'next-auth/jwt' {
  /** Whose cookie it is, and the row that each request looks up. */
  interface JWT {
    sub: string;
    sid: string;
  }
}
