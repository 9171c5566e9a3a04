export interface PolicyOptions {
  /** Fresh for each response; scripts of ours carry it. */
  readonly nonce: string;
  readonly secure: boolean;
  /** Next's development server evaluates code and injects styles. */
  readonly development: boolean;
  /** Origin of the configured map tiles, such as "https://tiles.example.org". */
  readonly tileOrigin: string | null;
}

/**
 * The content security policy of a page. Scripts only with the nonce, and WebAssembly, which the
 * phone's code reader is (it can do no more than the script that calls it); style attributes are
 * allowed (positions of marks on a scale), style elements and sheets only from here.
 */
export function contentSecurityPolicy(options: PolicyOptions): string {
  const { nonce, secure, development, tileOrigin } = options;
  const rules: Record<string, string> = {
    "default-src": "'self'",
    "script-src": `'self' 'nonce-${nonce}' 'strict-dynamic' 'wasm-unsafe-eval'${development ? " 'unsafe-eval'" : ""}`,
    "style-src": `'self' ${development ? "'unsafe-inline'" : `'nonce-${nonce}'`}`,
    "style-src-attr": "'unsafe-inline'",
    "img-src": `'self' data: blob:${tileOrigin ? ` ${tileOrigin}` : ""}`,
    "font-src": "'self'",
    "connect-src": `'self'${development ? " ws:" : ""}`,
    "worker-src": "'self'",
    "manifest-src": "'self'",
    "object-src": "'none'",
    "base-uri": "'none'",
    "form-action": "'self'",
    "frame-ancestors": "'none'",
  };
  const lines = Object.entries(rules).map(([name, value]) => `${name} ${value}`);
  return (secure ? [...lines, "upgrade-insecure-requests"] : lines).join("; ");
}

/** The headers of every answer, besides the policy. */
export function securityHeaders(secure: boolean): Record<string, string> {
  return {
    "X-Content-Type-Options": "nosniff",
    "X-Frame-Options": "DENY",
    // Links in mails carry tokens: no path of ours is told to anybody.
    "Referrer-Policy": "same-origin",
    "Permissions-Policy":
      "camera=(self), geolocation=(self), microphone=(), payment=(), usb=(), browsing-topics=()",
    "Cross-Origin-Opener-Policy": "same-origin",
    "Cross-Origin-Resource-Policy": "same-origin",
    ...(secure ? { "Strict-Transport-Security": "max-age=31536000; includeSubDomains" } : {}),
  };
}

/** Whether this is Next's development server, which needs a laxer policy. */
export function isDevelopment(): boolean {
  return process.env.NODE_ENV === "development";
}
