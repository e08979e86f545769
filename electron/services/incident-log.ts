import { randomBytes } from 'node:crypto';
import { appendFileSync, mkdirSync, renameSync, statSync } from 'node:fs';
import { join } from 'node:path';

/** Bytes after which the log starts anew; one older file is kept. */
const maxLogBytes = 1024 * 1024;

export interface IncidentLog {
  /** Keeps the fault and returns the id that the user is told. */
  record(serviceName: string, error: unknown): string;
}

/**
 * Faults of this program, one JSON object a line. The folder is made when the first fault comes. A log that
 * cannot be written must not turn one fault into two: then the fault goes to standard error.
 */
export function createIncidentLog(folder: string): IncidentLog {
  const path = join(folder, 'incidents.ndjson');
  return {
    record(serviceName, error) {
      const id = randomBytes(4).toString('hex');
      const detail = error instanceof Error ? (error.stack ?? error.message) : String(error);
      const line = JSON.stringify({ id, time: new Date().toISOString(), serviceName, detail });
      try {
        mkdirSync(folder, { recursive: true });
        startAnewWhenFull(path);
        appendFileSync(path, `${line}\n`);
      } catch {
        process.stderr.write(`${line}\n`);
      }
      return id;
    },
  };
}

function startAnewWhenFull(path: string): void {
  const size = statSync(path, { throwIfNoEntry: false })?.size ?? 0;
  if (size > maxLogBytes) renameSync(path, `${path}.old`);
}
