import { readFileSync } from 'node:fs';

/** The wire of fuses: a mark in the executable, then version, count, and one character a fuse. */
const fuseMark = 'dL7pKGdnNz796PbbjQWNKmHXBZaB9tsX';

/** Fuses in the order of Electron's own list. */
export const fuseNames = [
  'runAsNode',
  'cookieEncryption',
  'nodeOptions',
  'nodeCliInspect',
  'embeddedAsarIntegrity',
  'onlyLoadAppFromAsar',
  'loadBrowserProcessSpecificV8Snapshot',
  'grantFileProtocolExtraPrivileges',
] as const;

/** An executable with nothing in it but fuses as a fresh Electron has them. */
export const fuseWire = Buffer.concat([Buffer.from(fuseMark), Buffer.from([1, 8]), Buffer.from('10110001')]);

export function readFuses(executable: string): Record<string, boolean> {
  const bytes = readFileSync(executable);
  const at = bytes.indexOf(fuseMark);
  if (at < 0) throw new Error('no fuses in the executable');
  const states = bytes.subarray(at + fuseMark.length + 2).toString('latin1');
  return Object.fromEntries(fuseNames.map((name, index) => [name, states[index] === '1']));
}

interface Entry {
  readonly files?: Readonly<Record<string, Entry>>;
  readonly offset?: string;
  readonly size?: number;
}

/** All files of an asar archive: a header of JSON, whose offsets count from its end. */
export function readAsar(path: string): Map<string, Uint8Array> {
  const bytes = readFileSync(path);
  const headerEnd = 8 + bytes.readUInt32LE(4);
  const jsonLength = bytes.readUInt32LE(12);
  const header = JSON.parse(bytes.subarray(16, 16 + jsonLength).toString('utf8')) as Entry;
  const found = new Map<string, Uint8Array>();
  const walk = (entry: Entry, name: string): void => {
    for (const [child, inner] of Object.entries(entry.files ?? {}))
      walk(inner, name === '' ? child : `${name}/${child}`);
    if (entry.offset === undefined) return;
    const start = headerEnd + Number(entry.offset);
    found.set(name, bytes.subarray(start, start + (entry.size ?? 0)));
  };
  walk(header, '');
  return found;
}
