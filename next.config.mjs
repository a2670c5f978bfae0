// What must stay outside the bundle: native code, WASM loaders and anything that opens files by name.
export default {
  experimental: { authInterrupts: true },
  serverExternalPackages: ['knex', 'pdfjs-dist', '@napi-rs/canvas', '@techstark/opencv-js', '@hyzyla/pdfium', 'piscina', 'pino'],
  poweredByHeader: false,
  allowedDevOrigins: ['127.0.0.1'],
  devIndicators: false,
}
