import { existsSync, readFileSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { afterEach, describe, expect, test, vi } from 'vitest';
import { type Compute, createCompute } from '../../electron/services/compute.ts';
import { builtWorkerFile } from '../../electron/services/host.ts';
import { createIncidentLog } from '../../electron/services/incident-log.ts';
import { createNewsBus } from '../../electron/services/news-bus.ts';
import { fileFromPayload, payloadOfFile } from '../../electron/services/payload.ts';
import { inputFileOf } from '../../electron/services/read-input-file.ts';
import type { DiagnosisJob } from '../../electron/services/run-diagnosis.ts';
import type { News } from '../../shared-core/contract/news.ts';
import { temporaryFolder, write } from '../support/bench-folder.ts';

const folder = temporaryFolder();

describe('the incident log', () => {
  test('keeps what happened under the id that it gives', () => {
    const own = join(folder, 'log', 'deep');
    const id = createIncidentLog(own).record('diagnosis.run', new Error('boom'));
    const [line = ''] = readFileSync(join(own, 'incidents.ndjson'), 'utf8').trimEnd().split('\n');
    expect(JSON.parse(line)).toMatchObject({ id, serviceName: 'diagnosis.run' });
    expect(line).toContain('boom');
  });

  test('starts anew when it is full, and keeps the older one', () => {
    const own = temporaryFolderInside('full');
    writeFileSync(join(own, 'incidents.ndjson'), 'x'.repeat(1024 * 1024 + 1));
    createIncidentLog(own).record('a', 'b');
    expect(readFileSync(join(own, 'incidents.ndjson'), 'utf8').trimEnd().split('\n')).toHaveLength(1);
    expect(existsSync(join(own, 'incidents.ndjson.old'))).toBe(true);
  });

  test('that cannot be written still gives an id', () => {
    const heard = vi.spyOn(process.stderr, 'write').mockReturnValue(true);
    const id = createIncidentLog(write(folder, 'a-file', '')).record('a', 'why');
    expect(id).toMatch(/^[0-9a-f]{8}$/);
    expect(String(heard.mock.calls[0]?.[0])).toContain('why');
    heard.mockRestore();
  });

  function temporaryFolderInside(name: string): string {
    const own = join(folder, name);
    createIncidentLog(own).record('first', 'first');
    return own;
  }
});

describe('the news', () => {
  test('are numbered without gaps, and a page that comes back hears what it missed', () => {
    const bus = createNewsBus('0.1.0');
    const first: News[] = [];
    const stop = bus.subscribe(null, (news) => first.push(news));
    bus.publish({ kind: 'work', state: 'started', recordingName: 'a' });
    stop();
    bus.publish({ kind: 'work', state: 'done', recordingName: 'a' });
    const second: News[] = [];
    bus.subscribe(1, (news) => second.push(news));
    expect(first.map(({ sequence }) => sequence)).toEqual([0, 1]);
    expect(second.map(({ kind, sequence }) => [kind, sequence])).toEqual([
      ['connected', 2],
      ['work', 2],
    ]);
  });
});

test('a file comes over the wire as it was', () => {
  const bytes = Uint8Array.from({ length: 256 }, (_, index) => index);
  const file = inputFileOf('a.csv', bytes);
  const { sha256, ...payload } = payloadOfFile(file);
  expect(sha256).toBe(file.sha256);
  expect(fileFromPayload(payload, 'recording')).toEqual({ ok: true, value: file });
});

describe('the compute worker', () => {
  let compute: Compute | null = null;
  afterEach(async () => {
    await compute?.close();
    compute = null;
  });

  const neverCancelled = { onCancel: () => undefined };
  const job = (text: string): DiagnosisJob => ({
    recording: { name: 'a.csv', bytesBase64: Buffer.from(text).toString('base64') },
    dark: null,
    response: null,
    bench: null,
    options: { leftOut: [] },
  });
  const codeOf = async (answer: ReturnType<Compute['diagnose']>): Promise<string> => {
    const got = await answer;
    return got.ok ? 'ok' : got.problem.code;
  };

  test('answers jobs in order', async () => {
    compute = createCompute(builtWorkerFile);
    const codes = await Promise.all([
      codeOf(compute.diagnose(job(''), neverCancelled)),
      codeOf(compute.diagnose(job('words only\n'), neverCancelled)),
      codeOf(compute.diagnose(job(''), neverCancelled)),
    ]);
    expect(codes).toEqual(['file.empty', 'table.no-numbers', 'file.empty']);
  });

  test('is ended by a cancelled job, and the next job gets a new one', async () => {
    const endless = write(
      folder,
      'endless.cjs',
      `
      const { parentPort } = require('node:worker_threads');
      parentPort.on('message', (job) => {
        if (job.recording.name === 'endless') for (;;);
        parentPort.postMessage({ kind: 'answer', answer: { ok: true, value: { diagnosisJson: job.recording.name } } });
      });`,
    );
    compute = createCompute(endless);
    let stop = (): void => undefined;
    const signal = { onCancel: (wanted: () => void) => void (stop = joined(stop, wanted)) };
    const hangs = compute.diagnose({ ...job(''), recording: { name: 'endless', bytesBase64: '' } }, signal);
    const waits = compute.diagnose(job(''), neverCancelled);
    setTimeout(() => stop(), 100);
    await expect(hangs).rejects.toThrow('ended before it answered');
    expect(await waits).toEqual({ ok: true, value: { diagnosisJson: 'a.csv' } });
  });

  test('that faults rejects that job alone', async () => {
    const faulty = write(
      folder,
      'faulty.cjs',
      `
      const { parentPort } = require('node:worker_threads');
      let count = 0;
      parentPort.on('message', () => {
        count += 1;
        if (count === 2) throw new Error('worker fault');
        parentPort.postMessage({ kind: 'answer', answer: { ok: true, value: { diagnosisJson: String(count) } } });
      });`,
    );
    compute = createCompute(faulty);
    const count = async () => await compute?.diagnose(job(''), neverCancelled);
    expect(await count()).toMatchObject({ value: { diagnosisJson: '1' } });
    await expect(count()).rejects.toThrow('worker fault');
    expect(await count()).toMatchObject({ value: { diagnosisJson: '1' } });
  });

  const joined = (first: () => void, second: () => void) => (): void => {
    first();
    second();
  };
});
