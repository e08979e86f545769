import { extname } from 'node:path';
import { readWords, UsageFault } from './usage.ts';

export type Format = 'text' | 'json' | 'ndjson' | 'csv';

export interface DiagnoseArguments {
  readonly paths: readonly string[];
  readonly bench: string | null;
  readonly dark: string | null;
  readonly response: string | null;
  readonly profile: string | null;
  readonly mirror: string | null;
  readonly source: string | null;
  readonly through: string | null;
  readonly format: Format;
  /** Path of the report file, or of a folder for several. */
  readonly report: string | null;
  /** Check every temperature by Monte Carlo. */
  readonly monteCarlo: boolean;
}

export function diagnoseArguments(words: readonly string[]): DiagnoseArguments {
  const { values, positionals } = readWords(words, {
    bench: { type: 'string' },
    dark: { type: 'string' },
    response: { type: 'string' },
    profile: { type: 'string' },
    mirror: { type: 'string' },
    source: { type: 'string' },
    through: { type: 'string' },
    json: { type: 'boolean' },
    ndjson: { type: 'boolean' },
    csv: { type: 'boolean' },
    report: { type: 'string' },
    'monte-carlo': { type: 'boolean' },
  });
  if (positionals.length === 0) throw new UsageFault('diagnose wants at least one recording or folder.');
  const formats = (['json', 'ndjson', 'csv'] as const).filter((format) => values[format] === true);
  if (formats.length > 1)
    throw new UsageFault(`choose one of ${formats.map((f) => `--${f}`).join(' and ')}.`);
  for (const name of [
    'bench',
    'dark',
    'response',
    'profile',
    'mirror',
    'source',
    'through',
    'report',
  ] as const) {
    if (values[name] === '') throw new UsageFault(`--${name} wants a path.`);
  }
  if (positionals.includes('')) throw new UsageFault('a path is empty.');
  if (values.report !== undefined && extname(values.report).toLowerCase() === '.pdf') {
    throw new UsageFault('reports as PDF are not there yet; HTML is, so name a file that ends in .html.');
  }
  return {
    paths: positionals,
    bench: values.bench ?? null,
    dark: values.dark ?? null,
    response: values.response ?? null,
    profile: values.profile ?? null,
    mirror: values.mirror ?? null,
    source: values.source ?? null,
    through: values.through ?? null,
    format: formats[0] ?? 'text',
    report: values.report ?? null,
    monteCarlo: values['monte-carlo'] === true,
  };
}
