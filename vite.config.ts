import { defineConfig, type UserConfig } from 'vite';

/** pdfkit reads files of its own beside itself, so it stays a package; all else goes into the bundle. */
const external = ['pdfkit'];

/** The command line: `dist/cli.mjs` and beside it what only some commands load. */
const cli: UserConfig = {
  publicDir: false,
  build: {
    ssr: 'electron/cli/cli.ts',
    outDir: 'dist',
    emptyOutDir: false,
    target: 'node20',
    minify: false,
    rollupOptions: {
      external,
      output: { format: 'es', entryFileNames: 'cli.mjs', chunkFileNames: 'cli-[name].mjs' },
    },
  },
  ssr: { noExternal: true, external },
};

const modes: Readonly<Record<string, UserConfig>> = { cli };

/** Each thing to build is a mode: `vite build --mode cli`. */
export default defineConfig(({ mode }) => modes[mode] ?? {});
