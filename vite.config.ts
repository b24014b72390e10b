import { fileURLToPath } from 'node:url';
import { quasar, transformAssetUrls } from '@quasar/vite-plugin';
import vue from '@vitejs/plugin-vue';
import { defineConfig } from 'vite';

const here = (path: string) => fileURLToPath(new URL(path, import.meta.url));

export default defineConfig({
  publicDir: here('./src/public'),
  plugins: [
    vue({ template: { transformAssetUrls } }),
    quasar({ sassVariables: here('./src/css/quasar-variables.scss') }),
  ],
  build: {
    outDir: here('./dist/client'),
    emptyOutDir: true,
    // Plotly is one chunk of its own, loaded with the first plot.
    chunkSizeWarningLimit: 5000,
  },
  server: {
    host: '127.0.0.1',
    port: Number(process.env.VITE_PORT ?? 4311),
    strictPort: true,
    proxy: { '/api': { target: `http://127.0.0.1:${process.env.PORT ?? '4310'}`, changeOrigin: false } },
  },
});
