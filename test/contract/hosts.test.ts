import { afterAll, beforeAll, describe, expect, test, vi } from 'vitest';
import { type Client, createClient } from '../../shared-core/contract/client.ts';
import type { News } from '../../shared-core/contract/news.ts';
import { type ServiceName, serviceTable } from '../../shared-core/contract/service-table.ts';
import { readLineTable } from '../../shared-core/identify/read-line-table.ts';
import { openDesktopHost, openLoopbackHost, type OpenHost } from '../support/open-hosts.ts';

const names = Object.keys(serviceTable) as ServiceName[];
const base64 = (text: string): string => Buffer.from(text).toString('base64');

/** The same suite through both hosts: what one answers, the other answers too. */
describe.each([
  ['loopback', openLoopbackHost],
  ['desktop', openDesktopHost],
])('the %s host', (_name, open) => {
  let host: OpenHost;
  let client: Client;

  beforeAll(async () => {
    host = await open();
    client = createClient(host.bridge);
  });
  afterAll(() => host.close());

  test('says what the program is', async () => {
    const reply = await client.call('app.info', {});
    expect(reply).toEqual({
      ok: true,
      value: { name: 'lampwright', version: '0.1.0', maxFileBytes: 64 * 1024 * 1024 },
    });
  });

  test('hands out the line table, which parses', async () => {
    const reply = await client.call('lines.table', {});
    const table = readLineTable(reply.ok ? reply.value.csv : '');
    expect(table.ok ? table.value.length : 0).toBeGreaterThan(150);
  });

  test('opens the demo, whose diagnosis runs and tells its progress', async () => {
    const news: News[] = [];
    const stop = client.onNews((piece) => news.push(piece));
    await vi.waitFor(() => expect(news).toHaveLength(1));
    const demo = await client.call('demo.open', {});
    if (!demo.ok) throw new Error(demo.problem.found);
    const withoutHash = (file: { name: string; bytesBase64: string } | null) =>
      file === null ? null : { name: file.name, bytesBase64: file.bytesBase64 };
    const { recording, dark, response, bench } = demo.value;
    const reply = await client.call('diagnosis.run', {
      recording: { name: recording.name, bytesBase64: recording.bytesBase64 },
      dark: withoutHash(dark),
      response: withoutHash(response),
      bench: withoutHash(bench),
      options: { leftOut: [] },
    });
    const diagnosis = JSON.parse(reply.ok ? reply.value.diagnosisJson : '{}') as {
      temperature: { status: string };
      recording: { sha256: string };
    };
    expect(diagnosis.temperature.status).toBe('measured');
    expect(diagnosis.recording.sha256).toBe(recording.sha256);
    await vi.waitFor(() => expect(news).toHaveLength(3));
    stop();
    expect(news.map((piece) => (piece.kind === 'work' ? piece.state : piece.kind))).toEqual([
      'connected',
      'started',
      'done',
    ]);
    expect(news.slice(1).map((piece) => piece.sequence)).toEqual([1, 2]);
  });

  test('takes a mirror recording, and refuses one of another axis by name', async () => {
    const demo = await client.call('demo.open', {});
    if (!demo.ok) throw new Error(demo.problem.found);
    const recording = { name: 'lamp.csv', bytesBase64: demo.value.recording.bytesBase64 };
    const run = (mirror: { name: string; bytesBase64: string }) =>
      client.call('diagnosis.run', {
        recording,
        dark: null,
        response: null,
        bench: null,
        mirror,
        options: { leftOut: [] },
      });
    const taken = await run({ ...recording, name: 'mirror.csv' });
    const diagnosis = JSON.parse(taken.ok ? taken.value.diagnosisJson : '{}') as {
      inputs: { mirror: { name: string } | null };
      opticalDepths: readonly { method: string }[];
    };
    expect(diagnosis.inputs.mirror?.name).toBe('mirror.csv');
    expect(diagnosis.opticalDepths.every(({ method }) => method === 'mirror')).toBe(true);
    const rows = Array.from({ length: 20 }, (_, px) => `${String(500 + px)},${String(1000 + (px % 3))}`);
    const refused = await run({ name: 'mirror.csv', bytesBase64: base64(rows.join('\n')) });
    expect(refused.ok ? null : refused.problem).toMatchObject({
      code: 'pair.axis',
      subject: 'mirror recording',
      fileName: 'mirror.csv',
    });
  });

  test('answers a recording that is none with a problem that names it', async () => {
    const reply = await client.call('diagnosis.run', {
      recording: { name: 'notes.csv', bytesBase64: base64('no numbers here\n') },
      dark: null,
      response: null,
      bench: null,
      options: { leftOut: [] },
    });
    expect(reply.ok ? null : reply.problem).toMatchObject({
      code: 'table.no-numbers',
      fileName: 'notes.csv',
      subject: 'recording',
    });
  });

  test('answers damaged base64 with a problem, not with other bytes', async () => {
    const reply = await client.call('diagnosis.run', {
      recording: { name: 'a.csv', bytesBase64: 'AA!A' },
      dark: null,
      response: null,
      bench: null,
      options: { leftOut: [] },
    });
    expect(reply.ok ? null : reply.problem.code).toBe('file.unreadable');
  });

  test.each(names)('refuses a wrong input of %s with the same words as any host', async (name) => {
    const reply = await host.bridge.call(name, { unexpected: true });
    expect(reply).toMatchObject({ ok: false, problem: { code: 'service.refused', subject: 'call' } });
  });

  test.each(['nothing.here', '__proto__', 'toString', ''])('refuses the unknown service %j', async (name) => {
    const reply = await host.bridge.call(name, {});
    expect(reply).toMatchObject({ ok: false, problem: { code: 'service.refused' } });
  });
});
