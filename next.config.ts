import type { NextConfig } from 'next'

const config: NextConfig = {
  turbopack: { root: import.meta.dirname },
  poweredByHeader: false,
  // `npm run check` checks the types of everything; the build need not do it a second time.
  typescript: { ignoreBuildErrors: true },
  reactStrictMode: true,
  serverExternalPackages: ['pino', 'exceljs', 'pg-boss', 'nodemailer'],
}

export default config
