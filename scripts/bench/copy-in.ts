import type pg from "pg";

/** The part of the driver's connection that COPY speaks through (pg's own, undocumented). */
interface CopyConnection {
  query(text: string): void;
  sendCopyFromChunk(chunk: Buffer): void;
  endCopyFrom(): void;
}

/** `copy ... from stdin` with text already in PostgreSQL's own format, the fastest way in. */
class CopyIn {
  callback: ((error: Error | null) => void) | undefined;

  constructor(
    private readonly text: string,
    private readonly data: Buffer,
  ) {}

  submit(connection: CopyConnection): void {
    connection.query(this.text);
  }
  handleCopyInResponse(connection: CopyConnection): void {
    connection.sendCopyFromChunk(this.data);
    connection.endCopyFrom();
  }
  handleRowDescription(): void {}
  handleDataRow(): void {}
  handleCommandComplete(): void {}
  handleReadyForQuery(): void {
    this.callback?.(null);
  }
  handleError(error: Error): void {
    this.callback?.(error);
  }
}

/** Sends rows in; resolves when the server has taken them all. */
export async function copyIn(client: pg.Client, text: string, data: string): Promise<void> {
  const copy = new CopyIn(text, Buffer.from(data));
  await new Promise<void>((resolve, reject) => {
    copy.callback = (error) => (error ? reject(error) : resolve());
    client.query(copy as unknown as pg.Submittable);
  });
}
