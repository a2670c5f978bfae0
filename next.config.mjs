const development = process.env.NODE_ENV === 'development'

// Nothing is loaded from anywhere but the school's own machine. Next writes inline scripts; the PDF reader's decoders are WebAssembly; development needs eval to reload.
const policy = [
  "default-src 'self'",
  `script-src 'self' 'unsafe-inline' 'wasm-unsafe-eval'${development ? " 'unsafe-eval'" : ''}`,
  "style-src 'self' 'unsafe-inline'",
  "img-src 'self' data: blob:",
  "font-src 'self' data:",
  `connect-src 'self'${development ? ' ws:' : ''}`,
  "worker-src 'self' blob:",
  "object-src 'none'",
  "base-uri 'self'",
  "form-action 'self'",
  "frame-ancestors 'none'",
].join('; ')

const headers = [
  { key: 'Content-Security-Policy', value: policy },
  { key: 'X-Content-Type-Options', value: 'nosniff' },
  { key: 'Referrer-Policy', value: 'same-origin' },
  { key: 'Permissions-Policy', value: 'camera=(), microphone=(), geolocation=()' },
]

/** @type {import('next').NextConfig} */
const config = {
  experimental: { authInterrupts: true },
  // What must stay outside the bundle: native code, WASM loaders and anything that opens files by name.
  serverExternalPackages: ['knex', 'pdfjs-dist', '@napi-rs/canvas', '@techstark/opencv-js', '@hyzyla/pdfium', 'piscina', 'zxing-wasm', 'pino', 'mailparser'],
  poweredByHeader: false,
  // `npm test` checks types by itself; building on a school's machine need not do it again.
  typescript: { ignoreBuildErrors: true },
  allowedDevOrigins: ['127.0.0.1'],
  devIndicators: false,
  headers: async () => [{ source: '/(.*)', headers }],
}

export default config
