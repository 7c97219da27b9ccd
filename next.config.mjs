/** @type {import('next').NextConfig} */
const config = {
  output: 'standalone',
  // This checkout, whatever lock files lie in folders above it.
  outputFileTracingRoot: import.meta.dirname,
  turbopack: { root: import.meta.dirname },
  distDir: process.env.FIRSTPULL_DIST_DIR || '.next',
  poweredByHeader: false,
  reactStrictMode: true,
  typedRoutes: false,
  serverExternalPackages: [
    'pg',
    'pg-boss',
    'nodemailer',
    'piscina',
    '@react-pdf/renderer',
    'archiver',
    'pino',
    'pusher',
  ],
  typescript: { ignoreBuildErrors: true },
  // Static files are served past proxy.ts, which sets the headers of everything else.
  async headers() {
    return [
      {
        source: '/_next/static/:path*',
        headers: [
          { key: 'x-content-type-options', value: 'nosniff' },
          { key: 'cross-origin-resource-policy', value: 'same-origin' },
        ],
      },
    ];
  },
  experimental: { optimizePackageImports: ['react-aria-components'] },
};

export default config;
