/** Headers of every answer. A page's content policy has a one-time number in it and comes from proxy.ts. */
const everywhere = [
  { key: 'X-Content-Type-Options', value: 'nosniff' },
  { key: 'Referrer-Policy', value: 'same-origin' },
  { key: 'X-Frame-Options', value: 'DENY' },
  { key: 'Cross-Origin-Opener-Policy', value: 'same-origin' },
  { key: 'Cross-Origin-Resource-Policy', value: 'same-origin' },
  { key: 'Permissions-Policy', value: 'camera=(), geolocation=(), microphone=(), payment=(), usb=()' },
];

/** An answer of the HTTP interface is data: opened in a browser it may load and run nothing. */
const dataOnly = [{ key: 'Content-Security-Policy', value: "default-src 'none'; frame-ancestors 'none'" }];

/** @type {import('next').NextConfig} */
const config = {
  poweredByHeader: false,
  typedRoutes: true,
  // Sequelize requires its dialects by computed names, which a bundler cannot follow.
  serverExternalPackages: ['sequelize', 'mariadb', '@node-rs/argon2', 'pino'],
  headers: async () => [
    { source: '/:path*', headers: everywhere },
    { source: '/api/:path*', headers: dataOnly },
  ],
};

export default config;
