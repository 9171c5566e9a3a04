import { createServer, request, type Server } from "node:http";
import type { AddressInfo } from "node:net";

/** A way to the network that can be cut: for pages, service workers and the browser alike. */
export interface SeverableNetwork {
  /** For the browser's `--proxy-server`. */
  readonly address: string;
  /** From now on every connection is refused, as where there is no network at all. */
  readonly cut: () => Promise<void>;
}

/** A forward proxy on loopback (RFC 9112 3.2.2: absolute-form targets). */
export async function severableNetwork(): Promise<SeverableNetwork> {
  const server: Server = createServer((asked, answer) => {
    const { method, headers } = asked;
    const onwards = request(asked.url ?? "", { method, headers }, (got) => {
      answer.writeHead(got.statusCode ?? 502, got.headers);
      got.pipe(answer);
    });
    onwards.on("error", () => answer.destroy());
    asked.pipe(onwards);
  });
  await new Promise<void>((resolve) => server.listen(0, "127.0.0.1", resolve));
  const { port } = server.address() as AddressInfo;
  const cut = () =>
    new Promise<void>((resolve) => {
      server.close(() => resolve());
      server.closeAllConnections();
    });
  return { address: `http://127.0.0.1:${port}`, cut };
}
