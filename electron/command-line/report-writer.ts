import { stat } from 'node:fs/promises';
import { basename, extname, join } from 'node:path';
import type { Bench } from '../../shared-core/bench/bench.ts';
import { drawFigures, type ComputedRecording } from '../../shared-core/pipeline/diagnose-files.ts';
import { buildHtmlReport } from '../../shared-core/report/build-html-report.ts';
import { cautionsFor } from '../../shared-core/safety/cautions.ts';
import { atomicWrite } from '../services/atomic-write.ts';
import { systemReason } from '../services/read-input-file.ts';
import type { Work } from './plan-work.ts';
import { UsageFault } from './usage.ts';

export interface ReportWriter {
  /** Null when written or not asked for; else the sentence that says why not. */
  write(computed: ComputedRecording, work: Work, bench: Bench): Promise<string | null>;
}

/**
 * Reports of a run: one file when there is one recording, else a folder that exists, with one file a recording
 * called after it. A folder is never made, as a misspelt file name would then become one.
 */
export async function createReportWriter(
  target: string | null,
  recordingCount: number,
): Promise<ReportWriter> {
  if (target === null) return { write: () => Promise.resolve(null) };
  const isFolder = await isExistingFolder(target);
  if (!isFolder && recordingCount > 1) {
    throw new UsageFault(
      `--report with ${String(recordingCount)} recordings wants a folder that exists, found "${target}".`,
    );
  }
  if (!isFolder && !['.html', '.htm'].includes(extname(target).toLowerCase())) {
    throw new UsageFault(
      `--report wants a file that ends in .html or a folder that exists, found "${target}".`,
    );
  }
  const taken = new Set<string>();
  return {
    async write(computed, work, bench) {
      const { diagnosis, figures } = drawFigures(computed);
      const path = isFolder ? join(target, freeName(basename(work.path), taken)) : target;
      const generatedAt = new Date().toISOString();
      const cautions = cautionsFor(bench);
      const html = buildHtmlReport({ diagnosis, figures, cautions, bench, generatedAt });
      try {
        await atomicWrite(path, html);
        return null;
      } catch (error) {
        return `Could not write the report "${path}": ${systemReason(error)}. Check the folder and the space on the disk.`;
      }
    },
  };
}

/** "t07.csv.html", or "t07.csv-2.html" where an earlier recording of this run had the same name. */
function freeName(recordingName: string, taken: Set<string>): string {
  for (let count = 1; ; count += 1) {
    const name = `${recordingName}${count === 1 ? '' : `-${String(count)}`}.html`;
    // Folders of some systems do not tell capitals from small letters.
    if (!taken.has(name.toLowerCase())) {
      taken.add(name.toLowerCase());
      return name;
    }
  }
}

async function isExistingFolder(path: string): Promise<boolean> {
  try {
    return (await stat(path)).isDirectory();
  } catch {
    return false;
  }
}
