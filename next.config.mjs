/** @type {import('next').NextConfig} */
export default {
  poweredByHeader: false,
  devIndicators: false,
  reactStrictMode: true,
  serverExternalPackages: ['@resvg/resvg-js', 'pg-boss', 'pino', 'nodemailer'],
  turbopack: { root: import.meta.dirname },
};
