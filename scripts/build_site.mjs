// Builds web/dist from web/, the package's wheel and the runtime: plain files, relative addresses.
// Everything but the page, the manifest, the icons and the service worker carries a hash of its
// content in its name, so that two versions never share an address.
import { createHash } from 'node:crypto';
import fs from 'node:fs';
import path from 'node:path';
import { createRequire } from 'node:module';

const root = path.resolve(import.meta.dirname, '..');
// build_site.mjs [SOURCES [RESULT]]: the tests build a second version from changed sources.
const web = path.resolve(process.argv[2] ?? path.join(root, 'web'));
const target = path.resolve(process.argv[3] ?? path.join(web, 'dist'));
const runtime = path.join(root, '.cache/runtime'); // as it was released
const trimmed = path.join(root, '.cache/trimmed'); // what of it is shipped smaller
const out = `${target}.new`;
const esbuild = createRequire(path.join(web, 'package.json'))('esbuild');

const headers = JSON.parse(fs.readFileSync(path.join(root, 'scripts/headers.json'), 'utf8'));
const digest = (bytes, algorithm, encoding) => createHash(algorithm).update(bytes).digest(encoding);

/** Bundle entry points; gives the path of each result, relative to the site. */
function bundle(entryPoints, options = {}) {
  const result = esbuild.buildSync({
    entryPoints: entryPoints.map((entry) => path.join(web, entry)),
    absWorkingDir: web,
    outdir: out,
    entryNames: 'assets/[name]-[hash]',
    assetNames: 'assets/[name]-[hash]',
    chunkNames: 'assets/[name]-[hash]',
    bundle: true,
    minify: true,
    format: 'esm',
    target: 'es2022',
    loader: { '.woff2': 'file', '.svg': 'file', '.png': 'file' },
    external: ['node:*', 'ws'], // pyodide.mjs names them, and uses them only under Node
    metafile: true,
    logLevel: 'warning',
    ...options,
  });
  const names = {};
  for (const [file, { entryPoint }] of Object.entries(result.metafile.outputs)) {
    if (entryPoint) names[entryPoint] = path.relative(out, path.resolve(web, file));
  }
  return names;
}

/** Copy the runtime and the wheel into a folder named after their content. */
function placeRuntime() {
  const wheels = path.join(root, '.cache/wheel');
  const wheel = fs.readdirSync(wheels).find((name) => name.endsWith('.whl'));
  const lock = JSON.parse(fs.readFileSync(path.join(runtime, 'pyodide-lock.json'), 'utf8'));
  const { numpy } = lock.packages;
  const files = {};
  for (const name of ['pyodide.asm.js', 'pyodide.asm.wasm']) {
    files[name] = fs.readFileSync(path.join(runtime, name));
  }
  for (const name of ['python_stdlib.zip', numpy.file_name]) {
    files[name] = fs.readFileSync(path.join(trimmed, name));
  }
  lock.packages = { numpy: { ...numpy, sha256: digest(files[numpy.file_name], 'sha256', 'hex') } };
  files['pyodide-lock.json'] = Buffer.from(JSON.stringify(lock));
  files[wheel] = fs.readFileSync(path.join(wheels, wheel));
  const names = Object.keys(files).sort();
  const hash = digest(names.map((name) => `${name} ${digest(files[name], 'sha256', 'hex')}`).join('\n'),
    'sha256', 'hex');
  const folder = `runtime-${hash.slice(0, 12)}`;
  fs.mkdirSync(path.join(out, folder), { recursive: true });
  for (const name of names) fs.writeFileSync(path.join(out, folder, name), files[name]);
  return { folder, wheel };
}

/** index.html with the hashed names, and the policy for hosts that set no headers. */
function writePage() {
  let html = fs.readFileSync(path.join(web, 'index.html'), 'utf8');
  const sources = [...html.matchAll(/(?:src|href)="([^":#]+\.(?:js|css))"/g)].map((match) => match[1]);
  const define = { WORKER_URL: JSON.stringify(worker) };
  const built = bundle(sources, { define });
  const early = bundle(['app/early.js'], { define, format: 'iife' })['app/early.js'];
  for (const source of sources) html = html.replaceAll(`"${source}"`, `"${built[source]}"`);
  const policy = `<meta http-equiv="Content-Security-Policy" content="${headers['Content-Security-Policy']}">`;
  html = html.replace(/<meta http-equiv="Content-Security-Policy"[^>]*>\s*/, '')
    .replace(/<meta charset="utf-8">/i, (charset) => `${charset}\n  ${policy}\n  <script async src="${early}"></script>`);
  if (!html.includes(policy)) throw new Error('index.html needs <meta charset="utf-8">');
  fs.writeFileSync(path.join(out, 'index.html'), html);
}

/** Every file for the service worker to fetch, with what it must be. */
function precacheEntries() {
  return fs.readdirSync(out, { recursive: true, withFileTypes: true })
    .filter((entry) => entry.isFile())
    .map((entry) => path.relative(out, path.join(entry.parentPath ?? entry.path, entry.name)))
    .filter((url) => !url.startsWith('licences/'))
    .sort()
    .map((url) => {
      const bytes = fs.readFileSync(path.join(out, url));
      const hashed = /^(assets|runtime-\w+)\//.test(url);
      return {
        url,
        revision: hashed ? null : digest(bytes, 'sha256', 'hex').slice(0, 16),
        integrity: `sha256-${digest(bytes, 'sha256', 'base64')}`,
        bytes: bytes.length,
      };
    });
}

fs.rmSync(out, { recursive: true, force: true });
const engine = placeRuntime();
const worker = bundle(['worker/engine.js'], {
  alias: { pyodide: path.join(runtime, 'pyodide.mjs') },
  define: { ENGINE: JSON.stringify(engine) },
})['worker/engine.js'];
writePage();
for (const name of ['icons', 'manifest.webmanifest']) {
  if (fs.existsSync(path.join(web, name))) fs.cpSync(path.join(web, name), path.join(out, name), { recursive: true });
}
// Fonts come with the terms that they may be passed on under; nobody needs those on the hill.
const fonts = path.join(web, 'styles/fonts/OFL.txt');
if (fs.existsSync(fonts)) fs.cpSync(fonts, path.join(out, 'licences/fonts.txt'));
bundle(['service-worker/service-worker.js'], {
  entryNames: '[name]',
  format: 'iife', // a classic script: service workers as modules are not everywhere yet
  define: {
    PRECACHE: JSON.stringify(precacheEntries()),
    HEADERS: JSON.stringify(headers),
    'process.env.NODE_ENV': '"production"',
  },
});

// The new folder takes the old one's place whole.
fs.rmSync(`${target}.old`, { recursive: true, force: true });
if (fs.existsSync(target)) fs.renameSync(target, `${target}.old`);
fs.renameSync(out, target);
fs.rmSync(`${target}.old`, { recursive: true, force: true });
