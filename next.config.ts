import type { NextConfig } from 'next'

const config: NextConfig = {
  turbopack: { root: import.meta.dirname },
  poweredByHeader: false,
  reactStrictMode: true,
  serverExternalPackages: ['pino', 'exceljs', 'pg-boss', 'nodemailer'],
}

export default config
