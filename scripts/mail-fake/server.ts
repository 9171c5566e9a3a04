import { randomUUID } from "node:crypto";
import { createServer, type IncomingMessage, type ServerResponse } from "node:http";
import type { AddressInfo } from "node:net";
import { type Mail, Mailbox } from "./mailbox";
import { htmlView, listPage, mailPage, missingPage } from "./pages";
import { type Answer, Provider, refusal } from "./provider";
import { TroubleMaker } from "./trouble-maker";

/** Mails with files may be large: the provider takes 40 MB. */
const LARGEST_BODY = 60 * 1024 * 1024;
const LOOPBACK = /^(localhost|127\.0\.0\.1|\[::1\])(:\d+)?$/;
const OWN_PAGE =
  "default-src 'none'; style-src 'unsafe-inline'; frame-src 'self'; form-action 'self'";
const MAIL_VIEW =
  "sandbox allow-popups allow-popups-to-escape-sandbox; default-src 'none'; " +
  "style-src 'unsafe-inline'; img-src data:; font-src data:";

export interface MailFake {
  readonly address: string;
  readonly mails: () => readonly Mail[];
  readonly close: () => Promise<void>;
}

export interface MailFakeOptions {
  /** 0: any free port. */
  readonly port: number;
  /** Where mails are kept; null: in memory only. */
  readonly folder: string | null;
  readonly now?: () => Date;
}

/** A stand-in for the mail provider on the loopback interface. Nothing it accepts is sent. */
export async function startMailFake(options: MailFakeOptions): Promise<MailFake> {
  const mailbox = new Mailbox(options.folder);
  const provider = new Provider({
    mailbox,
    now: options.now ?? (() => new Date()),
    newId: randomUUID,
  });
  const post = new PostOffice(mailbox, provider, new TroubleMaker());
  const server = createServer((request, response) => void post.handle(request, response));
  await new Promise<void>((resolve, reject) => {
    server.once("error", reject);
    server.listen(options.port, "127.0.0.1", resolve);
  });
  return {
    address: `http://127.0.0.1:${(server.address() as AddressInfo).port}`,
    mails: () => mailbox.all(),
    close: async () => {
      server.closeAllConnections();
      await new Promise((resolve) => server.close(resolve));
    },
  };
}

class PostOffice {
  constructor(
    private readonly mailbox: Mailbox,
    private readonly provider: Provider,
    private readonly troubles: TroubleMaker,
  ) {}

  async handle(request: IncomingMessage, response: ServerResponse): Promise<void> {
    try {
      // A page elsewhere could name this machine by another host name and read the mails.
      if (!LOOPBACK.test(request.headers.host ?? "")) return json(response, 421, {});
      const path = new URL(request.url ?? "/", "http://localhost").pathname;
      if (path === "/emails" || path === "/emails/batch") {
        return await this.sendingRequest(request, response, path === "/emails" ? "one" : "batch");
      }
      if (path.startsWith("/_")) return await this.testRequest(request, response, path);
      if (request.method === "POST" && path === "/mails/clear") {
        this.mailbox.clear();
        response.writeHead(303, { location: "/" }).end();
        return;
      }
      this.show(response, path);
    } catch (error) {
      const message = error instanceof Error ? error.message : String(error);
      if (!response.headersSent) {
        answer(response, refusal(500, "internal_server_error", message));
      }
    }
  }

  private async sendingRequest(
    request: IncomingMessage,
    response: ServerResponse,
    endpoint: "one" | "batch",
  ): Promise<void> {
    if (request.method !== "POST") {
      return answer(response, refusal(405, "method_not_allowed", "Use POST."));
    }
    const body = await readJson(request);
    const trouble = await this.troubles.next();
    if (trouble === "hang up") return void request.socket.destroy();
    if (trouble) return answer(response, trouble);
    const denied = keyRefusal(request.headers.authorization);
    if (denied) return answer(response, denied);
    if (body === undefined) {
      return answer(response, refusal(400, "validation_error", "The body is not JSON."));
    }
    const key = request.headers["idempotency-key"];
    answer(response, this.provider.send(endpoint, body, typeof key === "string" ? key : null));
  }

  /** For tests: `GET /_mails`, `DELETE /_mails`, `POST /_control`, `GET /_health`. */
  private async testRequest(
    request: IncomingMessage,
    response: ServerResponse,
    path: string,
  ): Promise<void> {
    switch (`${request.method} ${path}`) {
      case "GET /_mails":
        return json(response, 200, this.mailbox.all());
      case "DELETE /_mails":
        this.mailbox.clear();
        return json(response, 200, {});
      case "POST /_control": {
        const wrong = this.troubles.take(await readJson(request));
        return json(response, wrong === null ? 200 : 422, wrong === null ? {} : { error: wrong });
      }
      case "GET /_health":
        return json(response, 200, { mails: this.mailbox.all().length });
      default:
        return json(response, 404, {});
    }
  }

  private show(response: ServerResponse, path: string): void {
    const [, folder, id, part, index] = path.split("/");
    if (path === "/") return html(response, 200, listPage(this.mailbox.all()));
    const mail = folder === "mails" && id ? this.mailbox.find(id) : undefined;
    if (mail && part === undefined) return html(response, 200, mailPage(mail));
    if (mail && part === "html") return html(response, 200, htmlView(mail), MAIL_VIEW);
    const file = part === "files" ? mail?.attachments[Number(index)] : undefined;
    if (!file) return html(response, 404, missingPage());
    response.writeHead(200, {
      "content-type": file.contentType.replace(/[^\x20-\x7e]/g, ""),
      "content-disposition": `attachment; filename*=UTF-8''${encodeURIComponent(file.filename)}`,
      "x-content-type-options": "nosniff",
    });
    response.end(Buffer.from(file.content, "base64"));
  }
}

/** Any key that looks like one is good: there is no account behind it. */
function keyRefusal(authorization: string | undefined): Answer | null {
  if (!authorization) return refusal(401, "missing_api_key", "Missing API Key");
  if (/^Bearer re_\S+$/.test(authorization)) return null;
  return refusal(401, "validation_error", "API key is invalid");
}

/** @returns undefined when it is not JSON */
async function readJson(request: IncomingMessage): Promise<unknown> {
  const parts: Buffer[] = [];
  let size = 0;
  for await (const part of request) {
    size += (part as Buffer).length;
    if (size > LARGEST_BODY) throw new Error(`The body is larger than ${LARGEST_BODY} bytes.`);
    parts.push(part as Buffer);
  }
  try {
    return JSON.parse(Buffer.concat(parts).toString("utf8"));
  } catch {
    return undefined;
  }
}

const answer = (response: ServerResponse, { status, body }: Answer) => json(response, status, body);

function json(response: ServerResponse, status: number, body: unknown): void {
  response.writeHead(status, { "content-type": "application/json", "cache-control": "no-store" });
  response.end(JSON.stringify(body));
}

function html(response: ServerResponse, status: number, text: string, policy = OWN_PAGE): void {
  response.writeHead(status, {
    "content-type": "text/html; charset=utf-8",
    "content-security-policy": policy,
    "cache-control": "no-store",
    "x-content-type-options": "nosniff",
  });
  response.end(text);
}
