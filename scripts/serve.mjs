import { randomUUID } from 'node:crypto';
import { createServer } from 'node:http';
import { join, resolve } from 'node:path';
import { pathToFileURL } from 'node:url';
import sirv from 'sirv';

/**
 * The http server around Astro's middleware: node scripts/serve.mjs WEB_FOLDER. It holds what a framework cannot:
 * time-outs, slow bodies, static files, forwarded headers, and an end that lets running uploads finish.
 */
const HEADERS_LIMIT_SECONDS = 20;
const KEEP_ALIVE_SECONDS = 65;
/** A body slower than this over a whole window is given up: it holds a connection for nothing. */
const SLOWEST_BODY_BYTES_PER_SECOND = 256;
const SLOW_BODY_WINDOW_SECONDS = 60;
const STOP_GRACE_SECONDS = 30;
const ONE_YEAR_SECONDS = 31_536_000;

const webFolder = resolve(process.argv[2] ?? 'dist/web');
const host = process.env.HOST ?? '127.0.0.1';
const port = Number(process.env.PORT ?? 4321);
const trustsProxy = process.env.RIPPLEBENCH_TRUST_PROXY === 'on';

const { handler } = await import(pathToFileURL(join(webFolder, 'server/entry.mjs')).href);
const serveStatic = sirv(join(webFolder, 'client'), {
  setHeaders(response, path) {
    response.setHeader('X-Content-Type-Options', 'nosniff');
    if (path.startsWith('/_astro/')) {
      response.setHeader('Cache-Control', `public, max-age=${String(ONE_YEAR_SECONDS)}, immutable`);
    }
  },
});

/** What this server says itself; the codes are those of the catalogue in src/server/errors.ts. */
const PROBLEMS = {
  'not-found': { status: 404, title: 'Not found', detail: 'There is nothing at this address.' },
  'method-not-allowed': {
    status: 405,
    title: 'Method not allowed',
    detail: 'No address here answers this method.',
    headers: { Allow: 'GET, HEAD, POST, PATCH' },
  },
  'request-timeout': {
    status: 408,
    title: 'The upload was too slow',
    detail: 'Less than 256 bytes a second arrived for a minute. Try again on a better connection.',
  },
  internal: {
    status: 500,
    title: 'Something went wrong here',
    detail: 'Try again; if it stays, tell the owner of your bench and name the request id.',
  },
  'shutting-down': {
    status: 503,
    title: 'The server is restarting',
    detail: 'Try again in a moment.',
    headers: { 'Retry-After': '5' },
  },
};

function sendProblem(response, code) {
  if (response.headersSent) {
    response.destroy();
    return;
  }
  const { status, title, detail, headers } = PROBLEMS[code];
  const requestId = randomUUID();
  if (status === 500) process.stderr.write(`request ${requestId}\n`);
  response.writeHead(status, {
    'Content-Type': 'application/problem+json',
    'X-Content-Type-Options': 'nosniff',
    'X-Request-Id': requestId,
    Connection: 'close',
    ...headers,
  });
  response.end(JSON.stringify({ type: `urn:ripplebench:problem:${code}`, title, status, code, detail, requestId }));
}

/** Watches a request body and answers 408 when it trickles. */
function watchBody(request, response) {
  let bytesBefore = request.socket.bytesRead;
  const timer = setInterval(() => {
    const receivedBytes = request.socket.bytesRead - bytesBefore;
    bytesBefore = request.socket.bytesRead;
    if (receivedBytes >= SLOWEST_BODY_BYTES_PER_SECOND * SLOW_BODY_WINDOW_SECONDS) return;
    clearInterval(timer);
    response.once('close', () => request.destroy());
    sendProblem(response, 'request-timeout');
  }, SLOW_BODY_WINDOW_SECONDS * 1000);
  timer.unref();
  for (const event of ['end', 'close']) request.once(event, () => clearInterval(timer));
}

/**
 * A refusal goes out while the body is still coming in. Node closes the connection with the answer when the client has
 * asked for that; the client, still sending, would then lose the answer. So the closing waits for the end of the body.
 */
function closeAfterBody(request, response) {
  if (response.shouldKeepAlive) return;
  response.shouldKeepAlive = true;
  response.once('finish', () => {
    if (request.complete) request.socket.end();
    else request.once('close', () => request.socket.end());
  });
}

const eventStreams = new Set();
let isStopping = false;

function rememberEventStream(response) {
  const writeHead = response.writeHead;
  response.writeHead = function writeHeadAndRemember(...headArguments) {
    const result = writeHead.apply(this, headArguments);
    // Headers that come with the call are not among those that `getHeader` knows.
    const given = headArguments.findLast((argument) => typeof argument === 'object');
    const contentType = given?.['content-type'] ?? response.getHeader('content-type');
    if (String(contentType).startsWith('text/event-stream')) {
      eventStreams.add(response);
      response.once('close', () => eventStreams.delete(response));
    }
    return result;
  };
}

const server = createServer((request, response) => {
  if (isStopping) {
    sendProblem(response, 'shutting-down');
    return;
  }
  if (!trustsProxy) {
    for (const name of ['x-forwarded-for', 'x-forwarded-proto', 'x-forwarded-host', 'x-forwarded-port', 'forwarded']) {
      delete request.headers[name];
    }
  }
  // The Fetch standard forbids a Request with this method, so Astro could not even refuse it.
  if (request.method === 'TRACE') {
    sendProblem(response, 'method-not-allowed');
    return;
  }
  if (request.url?.startsWith('/_image')) {
    sendProblem(response, 'not-found');
    return;
  }
  if (request.headers['content-length'] !== undefined || request.headers['transfer-encoding'] !== undefined) {
    watchBody(request, response);
    closeAfterBody(request, response);
  }
  rememberEventStream(response);
  const render = () => {
    Promise.resolve(handler(request, response, undefined, { nodeResponse: response })).catch((error) => {
      process.stderr.write(`${error?.stack ?? error}\n`);
      sendProblem(response, 'internal');
    });
  };
  if (request.method === 'GET' || request.method === 'HEAD') serveStatic(request, response, render);
  else render();
});

server.headersTimeout = HEADERS_LIMIT_SECONDS * 1000;
server.keepAliveTimeout = KEEP_ALIVE_SECONDS * 1000;
// Slow uploads on a phone may take long; `watchBody` ends those that do not move.
server.requestTimeout = 0;
server.listen(port, host);

for (const signal of ['SIGINT', 'SIGTERM']) {
  process.on(signal, () => {
    if (isStopping) return;
    isStopping = true;
    for (const response of eventStreams) response.end();
    server.close(() => process.exit(0));
    server.closeIdleConnections();
    setTimeout(() => server.closeAllConnections(), STOP_GRACE_SECONDS * 1000).unref();
  });
}
