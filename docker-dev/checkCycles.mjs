// npm run check:cycles: refuses import cycles among the project's own modules (type-only imports don't run, so don't count).
import { existsSync, readdirSync, readFileSync, statSync } from 'node:fs';
import { dirname, join, relative, resolve } from 'node:path';
import ts from 'typescript';
import { projectDir } from './services/settings.mjs';

const folders = ['shared', 'server', 'worker', 'src'];
const aliases = { '@/': 'src/', '@shared/': 'shared/' };

function* sourceFiles(folder) {
  for (const name of readdirSync(folder)) {
    const path = join(folder, name);
    if (statSync(path).isDirectory()) yield* sourceFiles(path);
    else if (/\.(ts|vue)$/.test(name)) yield path;
  }
}

function resolveImport(from, specifier) {
  const alias = Object.keys(aliases).find((prefix) => specifier.startsWith(prefix));
  if (!alias && !specifier.startsWith('.')) return null;
  const base = alias
    ? join(projectDir, aliases[alias], specifier.slice(alias.length))
    : resolve(dirname(from), specifier);
  const candidates = [base, base.replace(/\.js$/, '.ts'), `${base}.ts`, `${base}.vue`, join(base, 'index.ts')];
  return candidates.find((path) => existsSync(path) && statSync(path).isFile()) ?? null;
}

/** Script text of a module; of a component only what stands in its script blocks. */
function scriptOf(path) {
  const text = readFileSync(path, 'utf8');
  if (!path.endsWith('.vue')) return text;
  return [...text.matchAll(/<script[^>]*>([\s\S]*?)<\/script>/g)].map(([, script]) => script).join('\n');
}

const isTypeOnly = (clause) =>
  clause?.isTypeOnly ||
  (clause &&
    !clause.name &&
    clause.namedBindings?.elements?.length > 0 &&
    clause.namedBindings.elements.every((element) => element.isTypeOnly));

function importsOf(path) {
  const tree = ts.createSourceFile(path, scriptOf(path), ts.ScriptTarget.Latest, false, ts.ScriptKind.TS);
  return tree.statements
    .filter(
      (node) =>
        (ts.isImportDeclaration(node) && !isTypeOnly(node.importClause)) ||
        (ts.isExportDeclaration(node) && node.moduleSpecifier && !node.isTypeOnly),
    )
    .map((node) => resolveImport(path, node.moduleSpecifier.text))
    .filter((target) => target !== null);
}

const graph = new Map();
for (const folder of folders) {
  for (const path of sourceFiles(join(projectDir, folder))) graph.set(path, importsOf(path));
}

const state = new Map();
const cycles = [];
function visit(path, trail) {
  if (state.get(path) === 'done') return;
  if (state.get(path) === 'open') {
    cycles.push([...trail.slice(trail.indexOf(path)), path]);
    return;
  }
  state.set(path, 'open');
  for (const target of graph.get(path) ?? []) visit(target, [...trail, path]);
  state.set(path, 'done');
}
for (const path of graph.keys()) visit(path, []);

for (const cycle of cycles)
  console.error(`import cycle: ${cycle.map((path) => relative(projectDir, path)).join(' -> ')}`);
console.log(`${graph.size} modules, ${cycles.length} import cycles`);
process.exit(cycles.length > 0 ? 1 : 0);
