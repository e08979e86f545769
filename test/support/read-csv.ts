import Papa from 'papaparse';

/** Rows of CSV text by column name. */
export function readCsv(text: string): Record<string, string>[] {
  const parsed = Papa.parse<Record<string, string>>(text, { header: true, skipEmptyLines: true });
  if (parsed.errors.length > 0) throw new Error(parsed.errors[0]?.message);
  return parsed.data;
}
