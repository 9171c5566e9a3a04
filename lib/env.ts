import { z } from "zod";

const schema = z.object({
  DATABASE_URL: z.url({ protocol: /^postgres(ql)?$/ }),
  /** Signs session cookies; at least 32 characters. */
  AUTH_SECRET: z.string().min(32),
  /** The address people type; links in mails start with it. */
  APP_URL: z.url({ protocol: /^https?$/ }).default("http://localhost:3000"),
  RESEND_API_KEY: z.string().min(1).default("re_local_fake"),
  /** Left out: the provider's own address. */
  RESEND_BASE_URL: z.url().optional(),
  MAIL_FROM: z.string().min(3).default("Wanewright <wanewright@localhost>"),
  /** Where photos lie. Left out: phones keep theirs until it is set. */
  S3_BUCKET: z.string().min(3).max(63).optional(),
  /** Left out: the provider's own address for the region. */
  S3_ENDPOINT: z.url({ protocol: /^https?$/ }).optional(),
  S3_REGION: z.string().min(1).default("us-east-1"),
  /** Left out, both of them: what the machine itself may do. */
  S3_ACCESS_KEY_ID: z.string().min(1).optional(),
  S3_SECRET_ACCESS_KEY: z.string().min(1).optional(),
  LOG_LEVEL: z.enum(["debug", "info", "warn", "error", "silent"]).default("info"),
});

const keyPair = schema.refine(
  (env) => (env.S3_ACCESS_KEY_ID === undefined) === (env.S3_SECRET_ACCESS_KEY === undefined),
  { path: ["S3_SECRET_ACCESS_KEY"], message: "give it with S3_ACCESS_KEY_ID, or neither" },
);

export type Env = z.infer<typeof schema>;

/**
 * Parses the configuration once at boot.
 * @throws Error naming each variable that is missing or wrong, and what is wanted.
 */
export function parseEnv(source: Record<string, string | undefined>): Env {
  const result = keyPair.safeParse(source);
  if (result.success) return result.data;
  const lines = result.error.issues.map((i) => `  ${i.path.join(".")}: ${i.message}`);
  throw new Error(`Configuration is incomplete:\n${lines.join("\n")}`);
}
