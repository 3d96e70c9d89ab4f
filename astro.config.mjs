import node from '@astrojs/node';
import react from '@astrojs/react';
import tailwindcss from '@tailwindcss/vite';
import auth from 'auth-astro';
import { defineConfig } from 'astro/config';

export default defineConfig({
  output: 'server',
  adapter: node({ mode: 'standalone' }),
  integrations: [react(), auth({ injectEndpoints: false })],
  trailingSlash: 'never',
  devToolbar: { enabled: false },
  // Highlighting writes style attributes, which the content security policy refuses.
  markdown: { syntaxHighlight: false },
  // The host is checked against the configured origins in src/middleware.ts; without an entry here the
  // production build takes itself for http://localhost and refuses every form.
  security: {
    checkOrigin: false,
    allowedDomains: [{ protocol: 'http' }, { protocol: 'https' }],
  },
  experimental: {
    csp: {
      // FullCalendar 6 inserts an empty style element; this is the hash of the empty string.
      styleDirective: { hashes: ['sha256-47DEQpj8HBSa+/TImW+5JCeuQeRkm5NMpJWZG3hSuFU='] },
      directives: [
        "default-src 'self'",
        "img-src 'self' data:",
        // FullCalendar brings its few icons as a font in a data: address.
        "font-src 'self' data:",
        "connect-src 'self'",
        "worker-src 'self'",
        "object-src 'none'",
        "base-uri 'self'",
        "form-action 'self'",
      ],
    },
  },
  // Nothing from .env may get into the build; the server reads its environment when it starts.
  vite: { envDir: false, plugins: [tailwindcss()] },
});
