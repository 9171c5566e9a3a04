import pino from "pino";

/** One line of JSON an event. Never log passwords, tokens or whole bodies. */
export const log = pino({
  level: process.env.LOG_LEVEL ?? "info",
  base: null,
  redact: ["password", "token", "*.password", "*.token"],
  serializers: { error: pino.stdSerializers.err },
});
