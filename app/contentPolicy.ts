// What the page may load and where it may talk to: itself. Written once; the build puts it into index.html and the
// server sends it as a header.

const directives: Readonly<Record<string, string>> = {
  'default-src': "'none'",
  // The audio wrapper re-packs the worklet module as a blob, which the worklet loader counts as a script.
  'script-src': "'self' blob:",
  'style-src': "'self'",
  'img-src': "'self' data: blob:",
  'font-src': "'self'",
  'connect-src': "'self'",
  'worker-src': "'self'",
  'manifest-src': "'self'",
  'base-uri': "'none'",
  'form-action': "'none'",
}

const policy = Object.entries(directives).map(([name, sources]) => `${name} ${sources}`)

/** For the meta element of the built page. */
export const CONTENT_POLICY = policy.join('; ')

/** For the server: a header may also say that nobody frames the page. */
export const SERVED_HEADERS: Readonly<Record<string, string>> = {
  'Content-Security-Policy': [...policy, "frame-ancestors 'none'"].join('; '),
  'Cross-Origin-Opener-Policy': 'same-origin',
  'Cross-Origin-Embedder-Policy': 'require-corp',
  'Cross-Origin-Resource-Policy': 'same-origin',
  'Permissions-Policy': 'microphone=(self)',
  'Referrer-Policy': 'no-referrer',
  'X-Content-Type-Options': 'nosniff',
}
