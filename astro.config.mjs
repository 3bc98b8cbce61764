import node from '@astrojs/node';
import react from '@astrojs/react';
import tailwindcss from '@tailwindcss/vite';
import { defineConfig, passthroughImageService } from 'astro/config';

export default defineConfig({
  output: 'server',
  // Each build has a folder of its own, named by the hash of its sources: see scripts/setup/build.mjs.
  outDir: process.env.RIPPLEBENCH_WEB_OUT ?? './dist/web',
  // Our own http server stands in front: see scripts/serve.mjs.
  adapter: node({ mode: 'middleware' }),
  integrations: [react()],
  image: { service: passthroughImageService() },
  // Astro's rule covers form types only and refuses all while no domain is listed; src/middleware.ts holds ours.
  security: { checkOrigin: false },
  experimental: {
    csp: {
      directives: [
        "default-src 'self'",
        "img-src 'self' data: blob:",
        "font-src 'self'",
        "media-src 'self' blob:",
        "connect-src 'self'",
        "worker-src 'self' blob:",
        "form-action 'self'",
      ],
    },
  },
  devToolbar: { enabled: false },
  vite: { plugins: [tailwindcss()] },
});
