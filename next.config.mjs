/** @type {import('next').NextConfig} */
const config = {
  poweredByHeader: false,
  typedRoutes: true,
  // Sequelize requires its dialects by computed names, which a bundler cannot follow.
  serverExternalPackages: ['sequelize', 'mariadb', '@node-rs/argon2', 'pino'],
};

export default config;
