// Runs trim_runtime.py where its byte code will be used: in Pyodide, here under Node.
import fs from 'node:fs';
import path from 'node:path';

const root = path.resolve(import.meta.dirname, '..');
const source = path.join(root, '.cache/runtime');
const target = path.join(root, '.cache/trimmed');
const { loadPyodide } = await import(path.join(source, 'pyodide.mjs'));

fs.rmSync(target, { recursive: true, force: true });
fs.mkdirSync(target, { recursive: true });
// A fixed seed: sets are written in the same order every time.
const pyodide = await loadPyodide({ indexURL: source, env: { HOME: '/', PYTHONHASHSEED: '0' } });
pyodide.runPython(fs.readFileSync(path.join(root, 'scripts/trim_runtime.py'), 'utf8'));
const trim = (name, kept, folder) => {
  pyodide.FS.writeFile('/old', fs.readFileSync(path.join(source, name)));
  pyodide.runPython(`trim("/old", "/new", ${kept}, "${folder}")`);
  fs.writeFileSync(path.join(target, name), pyodide.FS.readFile('/new'));
};
const numpy = fs.readdirSync(source).find((name) => name.startsWith('numpy-'));
trim('python_stdlib.zip', 'kept_of_stdlib', '/lib/python312.zip');
trim(numpy, 'kept_of_numpy', '/lib/python3.12/site-packages');
