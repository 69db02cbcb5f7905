/** The app talks to its own server alone; nobody frames it, and no form leads elsewhere. */
const contentSecurityPolicy = [
  "connect-src 'self'",
  "img-src 'self' data: blob:",
  "font-src 'self' data:",
  "object-src 'none'",
  "base-uri 'self'",
  "form-action 'self'",
  "frame-ancestors 'none'",
].join('; ');

const HEADERS = {
  'content-security-policy': contentSecurityPolicy,
  'x-content-type-options': 'nosniff',
  'x-frame-options': 'DENY',
  'referrer-policy': 'same-origin',
};

/** @type {import('next').NextConfig} */
const config = {
  poweredByHeader: false,
  reactStrictMode: true,
  serverExternalPackages: ['pino', 'pg', 'bcryptjs'],
  async headers() {
    const headers = Object.entries(HEADERS).map(([key, value]) => ({ key, value }));
    return [{ source: '/:path*', headers }];
  },
};

export default config;
