/** @type {import('next').NextConfig} */
const config = {
  output: 'standalone',
  distDir: process.env.FIRSTPULL_DIST_DIR || '.next',
  poweredByHeader: false,
  reactStrictMode: true,
  typedRoutes: false,
  serverExternalPackages: ['pg', 'pg-boss', 'nodemailer', 'piscina', '@react-pdf/renderer', 'archiver', 'pino', 'pusher'],
  typescript: { ignoreBuildErrors: true },
  experimental: { optimizePackageImports: ['react-aria-components'] },
};

export default config;
