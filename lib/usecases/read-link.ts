import { z } from "zod";
import { findTokenOwner } from "@/db/queries/one-time-tokens";
import { hashOfSecret } from "./one-time-secret";
import { defineUseCase } from "./use-case";

/** Whom a link from a mail is for, without using it up; null when it no longer works. */
export const readLink = defineUseCase({
  name: "read-link",
  allow: { visitor: true },
  input: z.object({
    token: z.string().max(200),
    purpose: z.enum(["sign_in", "password", "invitation"]),
  }),
  run: (deps, _actor, { token, purpose }) =>
    findTokenOwner(deps.db, hashOfSecret(token), purpose, deps.now()),
});
