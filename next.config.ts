import type { NextConfig } from 'next';

const everyAnswer = [
  { key: 'X-Content-Type-Options', value: 'nosniff' },
  { key: 'X-Frame-Options', value: 'DENY' },
  { key: 'Referrer-Policy', value: 'strict-origin-when-cross-origin' },
  { key: 'Cross-Origin-Opener-Policy', value: 'same-origin' },
  { key: 'Cross-Origin-Resource-Policy', value: 'same-origin' },
  { key: 'X-Permitted-Cross-Domain-Policies', value: 'none' },
  {
    key: 'Permissions-Policy',
    value: 'camera=(), microphone=(), geolocation=(), payment=(), usb=(), browsing-topics=()',
  },
];

const nextConfig: NextConfig = {
  // A second development server in one tree needs a folder of its own.
  distDir: process.env.NEXT_DIST_DIR ?? '.next',
  reactStrictMode: true,
  // `npm test` checks the types of everything; a start need not check them again.
  typescript: { ignoreBuildErrors: true },
  poweredByHeader: false,
  // The development server would print the arguments of actions, passwords among them.
  logging: { serverFunctions: false },
  serverExternalPackages: ['sequelize', 'mariadb', 'piscina', '@node-rs/argon2', 'pino'],
  experimental: {
    serverActions: { bodySizeLimit: '1mb' },
    proxyClientMaxBodySize: '2mb',
  },
  headers: async () => [{ source: '/:path*', headers: everyAnswer }],
};

export default nextConfig;
