import { fileURLToPath } from 'node:url';
import vue from '@vitejs/plugin-vue';
import Components from 'unplugin-vue-components/vite';
import { ElementPlusResolver } from 'unplugin-vue-components/resolvers';
import { defineConfig } from 'vite';

const path = (relative: string) => fileURLToPath(new URL(relative, import.meta.url));
const underTest = Boolean(process.env.VITEST);

export default defineConfig(({ isSsrBuild }) => ({
  resolve: {
    alias: {
      '@': path('./src'),
      '@shared': path('./shared'),
      '@stdlib/assert-has-generator-support': path('./src/compat/has-generators.cjs'),
    },
  },
  plugins: [
    vue(),
    Components({
      dirs: [],
      dts: false,
      resolvers: [ElementPlusResolver({ importStyle: underTest ? false : 'css' })],
    }),
  ],
  build: isSsrBuild
    ? { outDir: 'dist/server', target: 'node20', emptyOutDir: true }
    : { outDir: 'dist/client', emptyOutDir: true, sourcemap: false },
  server: {
    port: 5173,
    // The local database writes there all the time.
    watch: { ignored: ['**/.local/**', '**/tests/artifacts/**'] },
    // The browser's own host stays in the request, so that the server sees a page of its own.
    proxy: {
      '/api': {
        target: process.env.QUARTZHOLD_API ?? 'http://127.0.0.1:3000',
        changeOrigin: false,
      },
    },
  },
}));
