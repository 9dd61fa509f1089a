import { mkdirSync, mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { request } from 'node:http';
import type { AddressInfo } from 'node:net';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import type { FastifyInstance } from 'fastify';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { reviewServer } from '../../../report/review/index.ts';
import { openSqliteStore } from '../../../store/index.ts';

const HOSTILE = '<img src=x onerror=alert(1)>';
const HOSTILE_FOLDER = 'hostile';
/** As report/page/night-page.ts states it: escaped, among the first lines. */
const STATED = 'default-src &#39;none&#39;; script-src &#39;sha256-q/c+d=&#39;; base-uri &#39;none&#39;';
const REPORT = `<!doctype html><html><head><meta http-equiv="Content-Security-Policy" content="${STATED}">`;
const CATALOGUE = 'spectrum_id\none\n';

let root: string;
let server: FastifyInstance;
const faults: Error[] = [];

function serverFor(host: string): FastifyInstance {
  const places = {
    store: join(root, 'store.sqlite'),
    nights: join(root, 'nights'),
    night: (name: string) => join(root, 'nights', name === HOSTILE ? HOSTILE_FOLDER : name),
  };
  return reviewServer(places, host, (error) => faults.push(error));
}

beforeAll(async () => {
  root = mkdtempSync(join(tmpdir(), 'shiftwork-review-'));
  for (const folder of ['2031-04-02', HOSTILE_FOLDER, 'handed-over', '.hidden']) {
    mkdirSync(join(root, 'nights', folder), { recursive: true });
    writeFileSync(join(root, 'nights', folder, 'report.html'), `${REPORT}${folder}`);
  }
  const night = join(root, 'nights', '2031-04-02');
  for (const kind of ['csv', 'fits', 'parquet', 'vot']) {
    writeFileSync(join(night, `catalogue.${kind}`), CATALOGUE);
  }
  const counts = { expected: 1234, rows: 1200, flagged: 30, unreadable: 4 };
  writeFileSync(join(night, 'run.json'), '{}');
  writeFileSync(join(night, 'secret.txt'), 'secret inside');
  writeFileSync(join(root, 'nights', 'handed-over', 'run.json'), JSON.stringify({ counts }));
  writeFileSync(join(root, 'report.html'), 'secret outside');
  writeFileSync(join(root, 'run.json'), 'secret outside');
  const store = await openSqliteStore(join(root, 'store.sqlite'));
  for (const name of ['2031-04-02', '2031-04-03', HOSTILE]) await store.saveNight({ name, settings: {} });
  await store.close();
  server = serverFor('127.0.0.1');
});

afterAll(async () => {
  await server.close();
  rmSync(root, { recursive: true });
});

describe('the list of nights', () => {
  it('has the nights of the store and folders handed over without one, and no hidden folder', async () => {
    const { statusCode, body } = await server.inject('/');
    expect(statusCode).toBe(200);
    expect(body).toContain('4 nights');
    expect(body).toContain('<a href="/nights/2031-04-02/"><bdi>2031-04-02</bdi></a>');
    expect(body).toContain('<bdi>2031-04-03</bdi> (no report yet)');
    expect(body).toContain('<a href="/nights/handed-over/">');
    expect(body).not.toContain('/nights/.hidden');
  });

  it('counts from the run record what the store does not know', async () => {
    const { body } = await server.inject('/');
    const row = body.slice(body.indexOf('handed-over'));
    const cells = [...row.matchAll(/<td class="number">([^<]*)<\/td>/g)].slice(0, 4).map((cell) => cell[1]);
    expect(cells).toEqual(['1\u{202F}234', '1\u{202F}200', '34', '4']);
  });

  it('escapes a name that looks like a tag, and its link leads to its report', async () => {
    const { body } = await server.inject('/');
    expect(body).not.toContain('<img');
    expect(body).toContain('&lt;img src=x onerror=alert(1)&gt;');
    const report = await server.inject(`/nights/${encodeURIComponent(HOSTILE)}/`);
    expect(report.body).toBe(`${REPORT}${HOSTILE_FOLDER}`);
  });
});

describe('a night', () => {
  it('is its report, under the policy the report states and in no frame', async () => {
    const { statusCode, body, headers } = await server.inject('/nights/2031-04-02/');
    expect([statusCode, body]).toEqual([200, `${REPORT}2031-04-02`]);
    expect(headers['content-security-policy']).toBe(
      "default-src 'none'; script-src 'sha256-q/c+d='; base-uri 'none'; frame-ancestors 'none'",
    );
    expect(headers['content-type']).toBe('text/html; charset=utf-8');
    expect(headers['cache-control']).toBe('no-store');
  });

  it('is found without the last stroke too', async () => {
    const { statusCode, headers } = await server.inject('/nights/2031-04-02');
    expect([statusCode, headers.location]).toEqual([302, '/nights/2031-04-02/']);
  });

  it.each([
    ['catalogue.csv', 'text/csv; charset=utf-8'],
    ['catalogue.fits', 'application/fits'],
    ['catalogue.parquet', 'application/vnd.apache.parquet'],
    ['catalogue.vot', 'application/x-votable+xml'],
    ['run.json', 'application/json; charset=utf-8'],
  ])('hands out %s to be saved under a name with the night in it', async (file, type) => {
    const { statusCode, headers } = await server.inject(`/nights/2031-04-02/${file}`);
    expect([statusCode, headers['content-type']]).toEqual([200, type]);
    expect(headers['content-disposition']).toBe(`attachment; filename="2031-04-02-${file}"`);
  });

  it('answers HEAD with the size and nothing else', async () => {
    const { body, headers } = await server.inject({
      method: 'HEAD',
      url: '/nights/2031-04-02/catalogue.csv',
    });
    expect([body, headers['content-length']]).toEqual(['', String(CATALOGUE.length)]);
  });

  it('that is unknown, has no report or not the file is 404 in plain words', async () => {
    const unknown = await server.inject('/nights/2031-04-09/');
    expect([unknown.statusCode, unknown.headers['content-type']]).toEqual([404, 'text/html; charset=utf-8']);
    expect(unknown.body).toContain('This workspace has no night called <bdi>2031-04-09</bdi>.');
    const early = await server.inject('/nights/2031-04-03/');
    expect(early.statusCode).toBe(404);
    expect(early.body).toContain('has no report yet');
    for (const file of ['secret.txt', 'report.html.bak', 'constructor', '__proto__']) {
      const { statusCode, body } = await server.inject(`/nights/2031-04-02/${file}`);
      expect([file, statusCode]).toEqual([file, 404]);
      expect(body).not.toContain('secret inside');
    }
  });
});

describe('the server', () => {
  it('leads nowhere outside the nights, however the dots and strokes are written', async () => {
    // Over a socket: inject() resolves dots before the server sees them.
    await server.listen({ host: '127.0.0.1', port: 0 });
    const { port } = server.server.address() as AddressInfo;
    const up = [
      '..',
      '%2e%2e',
      '%2E.',
      '.%2e',
      '%252e%252e',
      '..%2f',
      '..%5c',
      '2031-04-02%2f..%2f..',
      '%00',
    ];
    const paths = up.flatMap((dots) => [
      `/nights/${dots}/`,
      `/nights/${dots}/run.json`,
      `/nights/${dots}/report.html`,
      `/nights/2031-04-02/${dots}/run.json`,
      `/nights/2031-04-02/${dots}%2frun.json`,
      `/nights/2031-04-02/${dots}%2f${dots}%2frun.json`,
    ]);
    for (const path of [...paths, '/nights/.hidden/', '/nights//', '/nights/%zz/', '//etc/passwd']) {
      const { status, body } = await rawGet(port, path);
      expect([path, status === 404 || status === 400]).toEqual([path, true]);
      expect(body).not.toContain('secret');
      expect(body).not.toContain(REPORT);
    }
    expect((await rawGet(port, '/healthz')).body).toBe('ok\n');
  });

  it('says ok when asked for its health', async () => {
    const { statusCode, body } = await server.inject('/healthz');
    expect([statusCode, body]).toEqual([200, 'ok\n']);
  });

  it.each(['POST', 'PUT', 'DELETE', 'PATCH', 'OPTIONS'] as const)('refuses %s everywhere', async (method) => {
    for (const url of ['/', '/nights/2031-04-02/', '/nowhere']) {
      const { statusCode, headers, body } = await server.inject({ method, url, payload: 'x=1' });
      expect([statusCode, headers.allow]).toEqual([405, 'GET, HEAD']);
      expect(body).toContain('can be read');
    }
  });

  it('sends strict headers with every answer, refusals among them', async () => {
    for (const url of ['/', '/healthz', '/nowhere', '/nights/2031-04-02/catalogue.csv', '/nights/none/']) {
      const { headers } = await server.inject(url);
      expect(headers['x-content-type-options']).toBe('nosniff');
      expect(headers['cache-control']).toBe('no-store');
      expect(headers['content-security-policy']).toMatch(/^default-src 'none'; .*frame-ancestors 'none'/);
      expect(headers['content-security-policy']).not.toContain('unsafe');
    }
  });

  it.each([
    'evil.example',
    'evil.example:8017',
    'localhost.evil.example',
    '127.0.0.1.evil.example',
    'a@localhost',
  ])('on loopback, does not answer under the name %s', async (host) => {
    const { statusCode, body } = await server.inject({ url: '/', headers: { host } });
    expect(statusCode).toBe(421);
    expect(body).not.toContain('2031-04-02');
  });

  it.each(['localhost', 'LOCALHOST:8017', '127.0.0.1', '127.0.0.1:1'])(
    'on loopback, answers under the name %s',
    async (host) => {
      expect((await server.inject({ url: '/', headers: { host } })).statusCode).toBe(200);
    },
  );

  it('answers under its IPv6 address, and under any name once it listens beyond loopback', async () => {
    const v6 = await serverFor('::1').inject({ url: '/', headers: { host: '[::1]:8017' } });
    expect(v6.statusCode).toBe(200);
    const open = await serverFor('0.0.0.0').inject({ url: '/', headers: { host: 'survey.example' } });
    expect(open.statusCode).toBe(200);
  });

  it('tells its owner, not the asker, why reading the workspace failed', async () => {
    const places = { store: join(root, 'report.html'), nights: root, night: () => root };
    const told: string[] = [];
    const broken = reviewServer(places, '127.0.0.1', (error) => told.push(error.message));
    const { statusCode, body } = await broken.inject('/');
    expect(statusCode).toBe(500);
    expect(body).not.toContain('store.sqlite');
    expect(told.join()).toContain('is not a store');
  });

  it('met no fault of its own in all of this', () => {
    expect(faults).toEqual([]);
  });
});

/** GET of a path exactly as given. */
async function rawGet(port: number, path: string): Promise<{ status: number | undefined; body: string }> {
  return new Promise((resolve, reject) => {
    request({ host: '127.0.0.1', port, path, agent: false }, (response) => {
      let body = '';
      response.setEncoding('utf8').on('data', (text: string) => (body += text));
      response.on('end', () => {
        resolve({ status: response.statusCode, body });
      });
    })
      .on('error', reject)
      .end();
  });
}
