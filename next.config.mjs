/** @type {import('next').NextConfig} */
const config = {
  // The browser tests build beside a running product, whose files must stay as they are.
  distDir: process.env.RAREBOUND_DIST_DIR || '.next',
  // `npm test` checks the types of everything; a start does not wait for them.
  typescript: { ignoreBuildErrors: true },
  agentRules: false,
  poweredByHeader: false,
  reactStrictMode: true,
  serverExternalPackages: ['sequelize', 'graphile-worker', 'umzug', 'piscina', 'pdfkit'],
};

export default config;
