import NextAuth, { type NextAuthConfig } from "next-auth";
import Credentials from "next-auth/providers/credentials";
import { signInWithPassword } from "@/lib/usecases/sign-in-with-password";
import { signInWithToken } from "@/lib/usecases/sign-in-with-token";
import { deps, env } from "./deps";
import { log } from "./log";
import { SESSION_DAYS, sessionIsSecure } from "./session-cookie";
import { asSignedIn, SignInRefused } from "./sign-in-result";

declare module "next-auth" {
  interface Session {
    personId: string;
    sessionVersion: number;
  }
  interface User {
    sessionVersion: number;
  }
}

const providers: NextAuthConfig["providers"] = [
  Credentials({
    id: "password",
    credentials: { email: {}, password: {} },
    authorize: (given, request) =>
      asSignedIn(request, (visitor) => signInWithPassword(deps(), visitor, given as never)),
  }),
  Credentials({
    id: "link",
    credentials: { token: {} },
    authorize: (given, request) =>
      asSignedIn(request, (visitor) => signInWithToken(deps(), visitor, given as never)),
  }),
];

const callbacks: NextAuthConfig["callbacks"] = {
  jwt({ token, user }) {
    if (user) Object.assign(token, { personId: user.id, sessionVersion: user.sessionVersion });
    return token;
  },
  session({ session, token }) {
    session.personId = String(token.personId);
    session.sessionVersion = Number(token.sessionVersion);
    return session;
  },
};

const logger: NextAuthConfig["logger"] = {
  error(error) {
    // A refused sign-in is everyday life, not a defect; the audit has it.
    if (!(error instanceof SignInRefused)) log.error({ act: "auth", error }, "auth failed");
  },
  warn: () => undefined,
  debug: () => undefined,
};

/**
 * Sign-in with a password or with a one-time link from a mail. Sessions are signed
 * tokens (the credentials provider allows no other); `currentActor` makes them revocable.
 * The configuration is made on first use: a build has no environment.
 */
export const { handlers, auth, signIn, signOut } = NextAuth(() => ({
  secret: env().AUTH_SECRET,
  useSecureCookies: sessionIsSecure(env().APP_URL),
  trustHost: true,
  session: { strategy: "jwt", maxAge: SESSION_DAYS * 86_400 },
  pages: { signIn: "/sign-in", error: "/sign-in" },
  providers,
  callbacks,
  logger,
}));
