import { createHash } from "node:crypto";
import { createServer, type IncomingMessage, type ServerResponse } from "node:http";
import type { AddressInfo } from "node:net";
import { Shelf } from "./shelf";

const LOOPBACK = /^(localhost|127\.0\.0\.1|\[::1\])(:\d+)?$/;
const LARGEST_OBJECT = 64 * 1024 * 1024;

export interface StorageFake {
  readonly address: string;
  readonly close: () => Promise<void>;
}

export interface StorageFakeOptions {
  /** 0: any free port. */
  readonly port: number;
  /** Where objects are kept. */
  readonly folder: string;
  /** The one access key that is let in. */
  readonly accessKeyId: string;
}

/**
 * A stand-in for an S3 bucket on the loopback interface: whole objects are put, read, asked for and
 * deleted. Who calls is told by the access key that signed; what arrives must have the hash that
 * was signed. The signature itself is not reckoned again.
 */
export async function startStorageFake(options: StorageFakeOptions): Promise<StorageFake> {
  const shelf = new Shelf(options.folder);
  const server = createServer((request, response) => {
    void answer(shelf, options.accessKeyId, request, response).catch((error: Error) => {
      if (!response.headersSent) refuse(response, 500, "InternalError", error.message);
    });
  });
  await new Promise<void>((resolve, reject) => {
    server.once("error", reject);
    server.listen(options.port, "127.0.0.1", resolve);
  });
  return {
    address: `http://127.0.0.1:${(server.address() as AddressInfo).port}`,
    close: async () => {
      server.closeAllConnections();
      await new Promise((resolve) => server.close(resolve));
    },
  };
}

async function answer(
  shelf: Shelf,
  accessKeyId: string,
  request: IncomingMessage,
  response: ServerResponse,
): Promise<void> {
  // A page elsewhere could name this machine by another host name and read what lies here.
  if (!LOOPBACK.test(request.headers.host ?? "")) return refuse(response, 421, "Misdirected", "");
  const path = decodeURIComponent(new URL(request.url ?? "/", "http://localhost").pathname);
  if (path === "/_health") return void response.writeHead(200).end("ok");
  const [, signer] = /Credential=([^/,]+)\//.exec(request.headers.authorization ?? "") ?? [];
  if (signer !== accessKeyId)
    return refuse(response, 403, "AccessDenied", "Not signed by the key.");
  const key = path.slice(1);
  if (!/^[a-z0-9.-]{3,63}\/.+/.test(key)) {
    return refuse(response, 400, "InvalidRequest", "Name a bucket and a key.");
  }
  switch (request.method) {
    case "PUT":
      return put(shelf, key, request, response);
    case "GET":
    case "HEAD":
      return get(shelf, key, request, response);
    case "DELETE":
      await shelf.remove(key);
      return void response.writeHead(204).end();
    default:
      return refuse(response, 405, "MethodNotAllowed", "Put, get or delete whole objects.");
  }
}

async function put(shelf: Shelf, key: string, request: IncomingMessage, response: ServerResponse) {
  const parts: Buffer[] = [];
  let size = 0;
  for await (const part of request) {
    size += (part as Buffer).length;
    if (size > LARGEST_OBJECT) return refuse(response, 400, "EntityTooLarge", "Too large.");
    parts.push(part as Buffer);
  }
  const bytes = Buffer.concat(parts);
  const signed = String(request.headers["x-amz-content-sha256"] ?? "");
  if (/^[0-9a-f]{64}$/.test(signed) && signed !== sha256(bytes)) {
    return refuse(response, 400, "XAmzContentSHA256Mismatch", "The body is not what was signed.");
  }
  if (signed.startsWith("STREAMING")) {
    return refuse(response, 501, "NotImplemented", "Bodies in signed pieces are not taken here.");
  }
  const contentType = request.headers["content-type"] ?? "application/octet-stream";
  await shelf.put(key, { contentType, bytes });
  response.writeHead(200, { etag: `"${sha256(bytes).slice(0, 32)}"` }).end();
}

async function get(shelf: Shelf, key: string, request: IncomingMessage, response: ServerResponse) {
  const found = await shelf.get(key);
  if (!found) return refuse(response, 404, "NoSuchKey", "The key does not exist.");
  response.writeHead(200, {
    "content-type": found.contentType,
    "content-length": found.bytes.length,
  });
  response.end(request.method === "HEAD" ? undefined : found.bytes);
}

function refuse(response: ServerResponse, status: number, code: string, message: string): void {
  response.writeHead(status, { "content-type": "application/xml" });
  const safe = message.replaceAll(/[<>&]/g, "");
  response.end(
    `<?xml version="1.0"?><Error><Code>${code}</Code><Message>${safe}</Message></Error>`,
  );
}

const sha256 = (bytes: Buffer): string => createHash("sha256").update(bytes).digest("hex");
