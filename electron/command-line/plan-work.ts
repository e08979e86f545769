import { stat } from 'node:fs/promises';
import { fail, ok, type Problem, type Result } from '../../shared-core/result/result.ts';
import { isFile, recordingsInFolder, benchFileName } from '../services/folder-with-bench.ts';
import { systemReason, unreadable } from '../services/read-input-file.ts';
import { dirname, join } from 'node:path';
import type { DiagnoseArguments } from './diagnose-arguments.ts';

/** One recording to diagnose, with the bench file that goes with it. */
export interface Work {
  readonly path: string;
  readonly bench: string | null;
  /** A bench file that lies beside a recording given by itself, which is therefore not used. */
  readonly unusedBench: string | null;
}

export interface WorkPlan {
  /** In input order: work, or why a path gives none. */
  readonly items: readonly Result<Work>[];
  /** True when the answer is a list: several paths, or a folder. */
  readonly isList: boolean;
}

/** Turns the paths of the command into recordings, in order, each folder's sorted by name. */
export async function planWork(args: DiagnoseArguments): Promise<WorkPlan> {
  const items: Result<Work>[] = [];
  let hasFolder = false;
  for (const path of args.paths) {
    const kind = await kindOf(path);
    if (kind === 'folder') {
      hasFolder = true;
      items.push(...(await workInFolder(path, args)));
    } else if (kind === 'other') {
      items.push(ok(await workOfFile(path, args)));
    } else items.push(fail(unreadable('recording', path, kind.found)));
  }
  return { items, isList: hasFolder || args.paths.length > 1 };
}

async function workInFolder(folder: string, args: DiagnoseArguments): Promise<Result<Work>[]> {
  const others = [args.dark, args.response, args.profile, args.mirror, args.source, args.through].filter(
    (path) => path !== null,
  );
  const content = await recordingsInFolder(folder, { bench: args.bench, others });
  if (!content.ok) return [content];
  const { bench, recordings } = content.value;
  if (recordings.length === 0) return [fail(emptyFolder(folder))];
  return recordings.map((path) => ok({ path, bench, unusedBench: null }));
}

async function workOfFile(path: string, args: DiagnoseArguments): Promise<Work> {
  const beside = join(dirname(path), benchFileName);
  const isUnused = args.bench === null && (await isFile(beside));
  return { path, bench: args.bench, unusedBench: isUnused ? beside : null };
}

async function kindOf(path: string): Promise<'folder' | 'other' | { readonly found: string }> {
  try {
    return (await stat(path)).isDirectory() ? 'folder' : 'other';
  } catch (error) {
    return { found: systemReason(error) };
  }
}

function emptyFolder(folder: string): Problem {
  return {
    code: 'file.unreadable',
    fileName: folder,
    lineNumber: null,
    subject: 'folder',
    expected: 'recordings that end in .csv, .txt, .tsv, .dat or .asc',
    found: 'none',
    remedy: 'Name the recordings themselves if they end otherwise.',
  };
}
