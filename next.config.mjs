/** @type {import('next').NextConfig} */
export default {
  poweredByHeader: false,
  devIndicators: false,
  reactStrictMode: true,
  serverExternalPackages: ['@resvg/resvg-js', 'pg-boss', 'pino', 'nodemailer'],
  // The largest kernel document that the schema allows is about 1.3 MB.
  experimental: { serverActions: { bodySizeLimit: '4mb' } },
  turbopack: { root: import.meta.dirname },
};
