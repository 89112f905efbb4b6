import path from 'node:path';
import type { NextConfig } from 'next';

/** The packages are the project's, two folders up (scripts/bench/bare-server.mjs). */
const project = path.resolve(import.meta.dirname, '../..');

const nextConfig: NextConfig = {
  reactStrictMode: true,
  typescript: { ignoreBuildErrors: true },
  poweredByHeader: false,
  serverExternalPackages: ['mariadb'],
  turbopack: { root: project },
  outputFileTracingRoot: project,
};

export default nextConfig;
