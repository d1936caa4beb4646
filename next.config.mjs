/** @type {import('next').NextConfig} */
const config = {
  agentRules: false,
  poweredByHeader: false,
  reactStrictMode: true,
  serverExternalPackages: ['sequelize', 'graphile-worker', 'umzug'],
};

export default config;
