/**
 * What the workbench may load and whom it may talk to: itself. The server sends it as a header (with
 * `frame-ancestors`, which only a header can say); the page carries it too, for servers that don't.
 */
export const pagePolicy = [
  "default-src 'none'",
  "script-src 'self' 'wasm-unsafe-eval'",
  "worker-src 'self'",
  "style-src 'self' 'unsafe-inline'",
  "connect-src 'self'",
  "img-src 'self' blob: data:",
  "media-src 'self' blob:",
  "base-uri 'none'",
  "form-action 'none'",
].join("; ");
