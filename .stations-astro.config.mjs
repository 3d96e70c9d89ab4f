import base from './astro.config.mjs';
export default { ...base, cacheDir: '/tmp/stations-vite/astro', vite: { ...base.vite, cacheDir: '/tmp/stations-vite/vite', server: { hmr: false } } };
