import NextAuth from "next-auth";
import Credentials from "next-auth/providers/credentials";
import { signInWithPassword } from "@/lib/usecases/sign-in-with-password";
import { signInWithToken } from "@/lib/usecases/sign-in-with-token";
import { deps } from "./deps";
import { asSignedIn } from "./sign-in-result";

declare module "next-auth" {
  interface Session {
    personId: string;
    sessionVersion: number;
  }
  interface User {
    sessionVersion: number;
  }
}

/**
 * Sign-in with a password or with a one-time link from a mail. Sessions are signed
 * tokens (the credentials provider allows no other); `currentActor` makes them revocable.
 */
export const { handlers, auth, signIn, signOut } = NextAuth({
  trustHost: true,
  session: { strategy: "jwt", maxAge: 14 * 86_400 },
  pages: { signIn: "/sign-in", error: "/sign-in" },
  providers: [
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
  ],
  callbacks: {
    jwt({ token, user }) {
      if (user) Object.assign(token, { personId: user.id, sessionVersion: user.sessionVersion });
      return token;
    },
    session({ session, token }) {
      session.personId = String(token.personId);
      session.sessionVersion = Number(token.sessionVersion);
      return session;
    },
  },
});
