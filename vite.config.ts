import react from '@vitejs/plugin-react';
import { defineConfig, type UserConfig } from 'vite';

/** What has native parts or reads files of its own beside itself stays a package; all else goes into the bundle. */
const external = ['better-sqlite3', 'electron', 'pdfkit'];
const ssr: UserConfig['ssr'] = { noExternal: true, external };

interface Program {
  /** Entry files by the name of the program. */
  readonly entries: Readonly<Record<string, string>>;
  /** Prefix of what only some commands of the program load. */
  readonly chunks: string;
}

/** Programs for Node, as `dist/NAME.mjs`. */
function programs({ entries, chunks }: Program): UserConfig {
  return {
    publicDir: false,
    build: {
      ssr: true,
      outDir: 'dist',
      emptyOutDir: false,
      target: 'node20',
      minify: false,
      rollupOptions: {
        input: { ...entries },
        external,
        output: { format: 'es', entryFileNames: '[name].mjs', chunkFileNames: `${chunks}-[name].mjs` },
      },
    },
    ssr,
  };
}

/** The command line. */
const cli = programs({ entries: { cli: 'electron/cli/cli.ts' }, chunks: 'cli' });
/** The local browser host, and the launcher that chooses between it and the window. (A mode may not be called `local`.) */
const browser = programs({
  entries: { local: 'electron/local/main.ts', launch: 'electron/launch.ts' },
  chunks: 'local',
});
/** The desktop window's own process. */
const main = programs({ entries: { main: 'electron/window/main.ts' }, chunks: 'main' });

/** What the window hands to its page: one file that needs only `electron`, as a sandbox wants it. */
const preload: UserConfig = {
  publicDir: false,
  build: {
    ssr: 'electron/window/preload.ts',
    outDir: 'dist',
    emptyOutDir: false,
    target: 'node20',
    minify: false,
    rollupOptions: {
      external: ['electron'],
      output: { format: 'cjs', entryFileNames: 'preload.cjs', codeSplitting: false },
    },
  },
  ssr: { noExternal: true, external: ['electron'] },
};

/** The screens: `dist/page`, served by either host. Nothing is inlined, so the content policy needs no exception. */
const page: UserConfig = {
  root: 'renderer',
  base: './',
  publicDir: false,
  plugins: [react()],
  worker: { format: 'es' },
  build: {
    outDir: '../dist/page',
    emptyOutDir: true,
    target: 'es2022',
    assetsInlineLimit: 0,
    modulePreload: { polyfill: false },
    chunkSizeWarningLimit: 2000,
  },
};

const modes: Readonly<Record<string, UserConfig>> = { cli, browser, main, preload, page };

/** Each thing to build is a mode: `vite build --mode cli`. */
export default defineConfig(({ mode }) => modes[mode] ?? {});
