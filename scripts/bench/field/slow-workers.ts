import type { CDPSession } from "playwright-core";

interface Message {
  readonly sessionId: string;
  readonly message: string;
}

/**
 * Slows every service worker that starts from now on, as `Emulation.setCPUThrottlingRate` slows a
 * page. The browser holds a new worker still until it is slow.
 * @returns how many workers took the slow-down, and what others answered, once asked
 */
export async function slowWorkers(
  browser: CDPSession,
  rate: number,
): Promise<() => { readonly slowed: number; readonly refused: readonly string[] }> {
  let slowed = 0;
  const refused: string[] = [];
  const send = (sessionId: string, id: number, method: string, params: object = {}) =>
    browser.send("Target.sendMessageToTarget", {
      sessionId,
      message: JSON.stringify({ id, method, params }),
    });
  browser.on("Target.attachedToTarget", ({ sessionId, targetInfo }) => {
    void (async () => {
      if (targetInfo.type === "service_worker") {
        await send(sessionId, 1, "Emulation.setCPUThrottlingRate", { rate });
      }
      await send(sessionId, 2, "Runtime.runIfWaitingForDebugger");
    })().catch(() => undefined);
  });
  browser.on("Target.receivedMessageFromTarget", ({ message }: Message) => {
    const { id, error } = JSON.parse(message) as { id?: number; error?: { message: string } };
    if (id !== 1) return;
    if (error) refused.push(error.message);
    else slowed += 1;
  });
  await browser.send("Target.setAutoAttach", {
    ...{ autoAttach: true, waitForDebuggerOnStart: true, flatten: false },
    filter: [{ type: "service_worker", exclude: false }],
  });
  return () => ({ slowed, refused });
}
