/** @type {import('next').NextConfig} */
const config = {
  // Loaded by Node itself: their entities and migrations are found by name, and native parts stay native.
  serverExternalPackages: ['@mikro-orm/core', '@mikro-orm/postgresql', '@mikro-orm/knex', '@mikro-orm/migrations', 'knex', 'pg-boss', 'pdfkit'],
  poweredByHeader: false,
  agentRules: false,
  images: { unoptimized: true },
  experimental: { authInterrupts: true },
};
export default config;
