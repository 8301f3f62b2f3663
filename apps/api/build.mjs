import { fileURLToPath } from 'node:url';
import { build } from 'esbuild';

/** Bundles each program of the API into one file; what npm installs stays outside. */
const here = fileURLToPath(new URL('./', import.meta.url));
const [folder = `${here}dist`] = process.argv.slice(2);

await build({
  entryPoints: ['main', 'worker', 'migrate', 'verify', 'seed'].map(
    (name) => `${here}src/${name}.ts`,
  ),
  outdir: folder,
  outExtension: { '.js': '.mjs' },
  bundle: true,
  platform: 'node',
  target: 'node20',
  format: 'esm',
  sourcemap: true,
  logLevel: 'warning',
  tsconfig: `${here}../../tsconfig.base.json`,
  plugins: [
    {
      // Own packages are source and go in; `packages: 'external'` would leave them outside as well.
      name: 'own-source',
      setup(bundle) {
        bundle.onResolve({ filter: /^[^./]/ }, ({ kind, path }) =>
          kind === 'entry-point' || path.startsWith('@foldwell/')
            ? undefined
            : { path, external: true },
        );
      },
    },
  ],
});
