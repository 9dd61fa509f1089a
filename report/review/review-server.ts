import { open } from 'node:fs/promises';
import { basename, join } from 'node:path';
import type { FastifyInstance, FastifyReply, FastifyRequest } from 'fastify';
import { fastify } from 'fastify';
import { html, outside } from '../page/html.ts';
import { DOWNLOADS, REPORT_FILE } from './downloads.ts';
import { isLoopback, isMeantForHost } from './host-check.ts';
import type { ReviewPlaces, ShelvedNight } from './night-shelf.ts';
import { countsOfNights, shelvedNights } from './night-shelf.ts';
import { HEAD_BYTES, reportPolicy, styledPagePolicy } from './page-policy.ts';
import { nightAddress, nightListPage, PAGE_STYLE, refusalPage } from './pages.ts';

/** A request is a line and some headers; one that takes longer only holds a connection. */
const REQUEST_TIMEOUT_MS = 30_000;

/** Longest part of an address, percent signs and all: a night's name in another script takes nine for a letter. */
const LONGEST_PART = 2_048;

const PAGE_POLICY = styledPagePolicy(PAGE_STYLE);

/** Headers of every answer; a report sets its own policy instead of this one. */
const HEADERS = {
  'content-security-policy': PAGE_POLICY,
  'x-content-type-options': 'nosniff',
  'referrer-policy': 'no-referrer',
  'cross-origin-resource-policy': 'same-origin',
  'cross-origin-opener-policy': 'same-origin',
  // A night is measured again under the same address.
  'cache-control': 'no-store',
} as const;

/** Something the asker has to be told, with the status of HTTP (RFC 9110, 15) that goes with it. */
class Refusal extends Error {
  readonly status: number;
  readonly title: string;
  readonly sentence: ReturnType<typeof html>;

  constructor(status: number, title: string, sentence: ReturnType<typeof html>) {
    super(title);
    this.status = status;
    this.title = title;
    this.sentence = sentence;
  }
}

/**
 * A server of the nights of one workspace that only reads. It is not listening yet.
 *
 * `/` lists the nights, `/nights/NAME/` is a night's report, the files of DOWNLOADS stand beside it, `/healthz`
 * says ok. A name that is not in the list is never looked for on disk.
 *
 * @param host it will listen on; on a loopback host, requests meant for another host are refused
 * @param onFault told of errors behind an answer with status 500
 */
export function reviewServer(
  places: ReviewPlaces,
  host: string,
  onFault: (error: Error) => void,
): FastifyInstance {
  const server = fastify({
    requestTimeout: REQUEST_TIMEOUT_MS,
    routerOptions: { maxParamLength: LONGEST_PART },
    // Addresses that cannot be decoded reach neither the hooks nor the handler of errors.
    frameworkErrors: (_error, _request, reply) => {
      void refuse(reply, new Refusal(400, 'Not an address', html`This address cannot be read.`));
    },
  });
  server.addHook('onRequest', (request, reply, done) => {
    reply.headers(HEADERS);
    done(refusalOf(request, host));
  });
  server.setErrorHandler((error: Error, _request, reply) => {
    if (error instanceof Refusal) return refuse(reply, error);
    onFault(error);
    const sentence = html`Reading the workspace failed; where the server was started it says why.`;
    return refuse(reply, new Refusal(500, 'Something failed', sentence));
  });
  server.setNotFoundHandler((_request, reply) =>
    refuse(reply, new Refusal(404, 'Nothing here', html`There is no page at this address.`)),
  );

  server.get('/', async (_request, reply) => {
    const nights = await shelvedNights(places);
    return sendPage(reply, nightListPage(nights, await countsOfNights(places, nights)));
  });
  server.get('/healthz', async (_request, reply) => reply.type('text/plain; charset=utf-8').send('ok\n'));
  server.get<{ Params: { name: string } }>('/nights/:name', async (request, reply) => {
    const night = await nightNamed(places, request.params.name);
    return reply.redirect(nightAddress(night.name));
  });
  server.get<{ Params: { name: string } }>('/nights/:name/', async (request, reply) =>
    sendReport(reply, await nightNamed(places, request.params.name)),
  );
  server.get<{ Params: { name: string; file: string } }>('/nights/:name/:file', async ({ params }, reply) =>
    sendDownload(reply, await nightNamed(places, params.name), params.file),
  );
  return server;
}

/** Why a request is not answered: it wants more than reading, or was meant for another host. */
function refusalOf(request: FastifyRequest, host: string): Refusal | undefined {
  if (isLoopback(host) && !isMeantForHost(request.headers.host, host)) {
    const sentence = html`This server answers only under the name it listens on, localhost or 127.0.0.1.`;
    return new Refusal(421, 'Wrong host', sentence);
  }
  if (request.method !== 'GET' && request.method !== 'HEAD') {
    return new Refusal(405, 'Only reading', html`These pages can be read (GET, HEAD) and not changed.`);
  }
  return undefined;
}

/** @throws Refusal when the list does not have the name */
async function nightNamed(places: ReviewPlaces, name: string): Promise<ShelvedNight> {
  const night = (await shelvedNights(places)).find((one) => one.name === name);
  if (night === undefined) {
    const sentence = html`This workspace has no night called ${outside(name)}.`;
    throw new Refusal(404, 'Unknown night', sentence);
  }
  return night;
}

async function sendReport(reply: FastifyReply, night: ShelvedNight): Promise<FastifyReply> {
  if (!night.files.has(REPORT_FILE)) {
    const sentence = html`The night ${outside(night.name)} has no report yet: shiftwork report writes it.`;
    throw new Refusal(404, 'No report yet', sentence);
  }
  const file = await open(join(night.directory, REPORT_FILE));
  try {
    // The same open file for both: the policy must not be that of a report written in between.
    const { buffer, bytesRead } = await file.read(Buffer.alloc(HEAD_BYTES), 0, HEAD_BYTES, 0);
    reply.header('content-security-policy', reportPolicy(buffer.toString('utf8', 0, bytesRead)));
  } catch (error) {
    await file.close();
    throw error;
  }
  return reply.type('text/html; charset=utf-8').send(file.createReadStream({ start: 0 }));
}

async function sendDownload(reply: FastifyReply, night: ShelvedNight, name: string): Promise<FastifyReply> {
  const type = Object.hasOwn(DOWNLOADS, name) ? DOWNLOADS[name] : undefined;
  if (type === undefined || !night.files.has(name)) {
    const sentence = html`The night ${outside(night.name)} hands out no file called ${outside(name)}.`;
    throw new Refusal(404, 'Unknown file', sentence);
  }
  const file = await open(join(night.directory, name));
  // A night's folder has a name that needs no quoting.
  const saved = `${basename(night.directory).replace(/[^\w.-]/g, '_')}-${name}`;
  return reply
    .header('content-disposition', `attachment; filename="${saved}"`)
    .header('content-length', (await file.stat()).size)
    .type(type)
    .send(file.createReadStream());
}

function sendPage(reply: FastifyReply, page: string): FastifyReply {
  return reply.type('text/html; charset=utf-8').send(page);
}

function refuse(reply: FastifyReply, { status, title, sentence }: Refusal): FastifyReply {
  // RFC 9110, 15.5.6: such an answer must say which methods there are.
  if (status === 405) reply.header('allow', 'GET, HEAD');
  return sendPage(reply.code(status).headers(HEADERS), refusalPage(title, sentence));
}
