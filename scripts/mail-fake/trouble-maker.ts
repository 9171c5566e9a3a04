import { z } from "zod";
import { type Answer, refusal } from "./provider";

const order = z.object({
  /** Refuse so many sending requests. */
  fail: z
    .object({
      times: z.number().int().min(0),
      status: z.number().int().min(400).max(599).default(500),
      name: z.string().default("internal_server_error"),
      message: z.string().default("Told to fail."),
    })
    .optional(),
  /** Drop so many connections without an answer. */
  hangUp: z.number().int().min(0).optional(),
  /** Wait so long before each answer. */
  delayMs: z.number().int().min(0).max(60_000).optional(),
});

/** Lets a test have the provider fail, hang up or be slow: `POST /_control`. */
export class TroubleMaker {
  private failures: { left: number; answer: Answer } = { left: 0, answer: refusal(500, "", "") };
  private hangUps = 0;
  private delay = 0;

  /** @returns what is wrong with the order; null when it is taken */
  take(body: unknown): string | null {
    const parsed = order.safeParse(body);
    if (!parsed.success) return z.prettifyError(parsed.error);
    const { fail, hangUp, delayMs } = parsed.data;
    if (fail) {
      this.failures = { left: fail.times, answer: refusal(fail.status, fail.name, fail.message) };
    }
    this.hangUps = hangUp ?? this.hangUps;
    this.delay = delayMs ?? this.delay;
    return null;
  }

  /** What happens to the next sending request. */
  async next(): Promise<Answer | "hang up" | null> {
    if (this.delay > 0) await new Promise((resolve) => setTimeout(resolve, this.delay));
    if (this.hangUps > 0) {
      this.hangUps -= 1;
      return "hang up";
    }
    if (this.failures.left === 0) return null;
    this.failures.left -= 1;
    return this.failures.answer;
  }
}
