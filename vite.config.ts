import tailwindcss from '@tailwindcss/vite';
import react from '@vitejs/plugin-react';
import { join } from 'node:path';
import { defineConfig } from 'vite';
import type { Plugin } from 'vite';

/** The web's address behind Vite in development; a build does not use it. */
const webUrl = process.env.WEB_URL ?? 'http://127.0.0.1:4601';

/** The entries that a patient's first screen is made of. They stay files of their own under their own names. */
const firstScreen = ['src/main.tsx', 'src/app/shells/PatientShell.tsx', 'src/pages/TodayPage.tsx'].map(
  (file) => join(import.meta.dirname, file),
);

type ModuleGraph = { getModuleInfo: (id: string) => { importedIds: readonly string[] } | null };

function reachedFrom(roots: readonly string[], graph: ModuleGraph): Set<string> {
  const reached = new Set<string>();
  const waiting = [...roots];
  for (let id = waiting.pop(); id !== undefined; id = waiting.pop()) {
    if (reached.has(id)) continue;
    reached.add(id);
    waiting.push(...(graph.getModuleInfo(id)?.importedIds ?? []));
  }
  return reached;
}

/** Not needed by it, though the index of its library names it; an icon of its own screens gets there all the same. */
const notFirst =
  /react-i18next\/dist\/es\/Trans|html-parse-stringify|IcuTrans|lucide-react.*\/icons\/|mutationObserver|useMutation|infiniteQueryObserver|useInfiniteQuery/;

const routerFile = (name: string): string =>
  join(import.meta.dirname, `node_modules/react-router/dist/production/${name}.mjs`);

/**
 * The router ships a production build that its package names to nobody, and the other one explains to developers
 * what they do wrong. Patients need not load that.
 */
const productionRouter: Plugin = {
  name: 'production-router',
  apply: 'build',
  config: () => ({
    resolve: {
      alias: [
        { find: /^react-router$/, replacement: routerFile('index') },
        { find: /^react-router\/dom$/, replacement: routerFile('dom-export') },
      ],
    },
  }),
};

export default defineConfig({
  plugins: [productionRouter, react(), tailwindcss()],
  define: { __BUILD_ID__: JSON.stringify(process.env.BUILD_ID ?? 'development') },
  build: {
    outDir: 'dist/client',
    emptyOutDir: true,
    manifest: true,
    // The content policy allows no data: fonts or scripts, so nothing is inlined.
    assetsInlineLimit: 0,
    reportCompressedSize: false,
    // The lists of what to fetch ahead would weigh more in the first file than they save.
    modulePreload: false,
    rolldownOptions: {
      output: {
        codeSplitting: {
          groups: [
            {
              debugName: 'first',
              // One file instead of fifty small ones: fewer requests on a poor line, and it compresses better.
              name: (id, graph) =>
                !firstScreen.includes(id) && !notFirst.test(id) && reachedFrom(firstScreen, graph).has(id)
                  ? 'first'
                  : null,
            },
          ],
        },
      },
    },
  },
  server: {
    host: process.env.HOST ?? '127.0.0.1',
    port: Number(process.env.PORT ?? 4600),
    strictPort: true,
    proxy: {
      '/api': webUrl,
      '/outbox': webUrl,
      '/gateway': webUrl,
      '/healthz': webUrl,
      '/readyz': webUrl,
      '/socket.io': { target: webUrl, ws: true },
    },
  },
});
