import { readdirSync, readFileSync } from 'node:fs';
import { join, posix } from 'node:path';
import { fileURLToPath } from 'node:url';

export const projectRoot = fileURLToPath(new URL('../../', import.meta.url));

export interface SourceFile {
  /** From the root, with "/" on every system. */
  readonly path: string;
  readonly text: string;
  /** Targets of all imports and re-exports, types included: a path from the root, or a package name. */
  readonly imports: readonly string[];
}

/** All TypeScript sources below a folder of the project. */
export function sourceFiles(folder: string): SourceFile[] {
  return readdirSync(join(projectRoot, folder), { recursive: true, encoding: 'utf8' })
    .map((name) => posix.join(folder, name.replaceAll('\\', '/')))
    .filter((path) => /\.tsx?$/.test(path))
    .sort()
    .map((path) => {
      const text = readFileSync(join(projectRoot, path), 'utf8');
      return { path, text, imports: importsOf(path, text) };
    });
}

/** Static imports, `export ... from`, side-effect imports, dynamic imports and worker addresses. */
export function importsOf(path: string, text: string): string[] {
  const code = withoutComments(text);
  const patterns = [
    /\bfrom\s+['"]([^'"]+)['"]/g,
    /\bimport\s+['"]([^'"]+)['"]/g,
    /\bimport\s*\(\s*['"]([^'"]+)['"]/g,
    /new URL\(\s*['"](\.[^'"]+)['"]\s*,\s*import\.meta\.url/g,
  ];
  const names = patterns.flatMap((pattern) => [...code.matchAll(pattern)].map((match) => match[1] ?? ''));
  return names.map((name) => (name.startsWith('.') ? posix.join(posix.dirname(path), name) : name));
}

const withoutComments = (text: string): string =>
  text.replace(/\/\*[\s\S]*?\*\//g, '').replace(/^\s*\/\/.*$/gm, '');
