import node from '@astrojs/node';
import react from '@astrojs/react';
import tailwindcss from '@tailwindcss/vite';
import { defineConfig } from 'astro/config';

export default defineConfig({
  output: 'server',
  adapter: node({ mode: 'standalone' }),
  integrations: [react()],
  devToolbar: { enabled: false },
  // Our own origin check in src/middleware covers JSON as well as forms, and knows PUBLIC_URL.
  security: { checkOrigin: false },
  // Hashes of the page's own inline scripts; src/middleware/headers.ts makes the whole policy around them.
  experimental: { csp: true },
  vite: {
    plugins: [tailwindcss()],
    ssr: {
      external: ['sequelize', 'pg', 'pg-hstore', 'graphile-worker', 'exceljs', 'pino', 'prom-client'],
      // Astro nests zod 3; without this a built page resolves to another zod than development does.
      noExternal: ['zod'],
    },
    // A database directory inside the checkout would exhaust the file watchers.
    server: { watch: { ignored: ['**/.data/**', '**/dist/**'] } },
  },
});
