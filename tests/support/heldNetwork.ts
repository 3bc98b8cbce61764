import { vi } from 'vitest';

/** An upload that the page has begun and the test ends. */
export interface HeldUpload {
  readonly body: FormData;
  readonly headers: Readonly<Record<string, string>>;
  readonly progress: (sentBytes: number, totalBytes: number) => void;
  readonly answer: (status: number, body: unknown) => void;
  readonly breakOff: () => void;
}

interface HeldNetwork {
  readonly uploads: HeldUpload[];
  /** Answers of the JSON API by "METHOD path"; anything else is unreachable. */
  readonly answers: Map<string, { status: number; body: unknown }>;
}

/** Puts the test between page and server: XMLHttpRequest, fetch and EventSource. Take it away with vi.unstubAllGlobals. */
export function holdNetwork(): HeldNetwork {
  const uploads: HeldUpload[] = [];
  const answers: HeldNetwork['answers'] = new Map();
  vi.stubGlobal('XMLHttpRequest', heldRequestClass(uploads));
  vi.stubGlobal('EventSource', SilentEventSource);
  vi.stubGlobal('fetch', (address: string, { method = 'GET' }: RequestInit = {}) => {
    const answer = answers.get(`${method} ${address}`);
    if (!answer) return Promise.reject(new TypeError(`unreachable: ${method} ${address}`));
    return Promise.resolve(new Response(JSON.stringify(answer.body), { status: answer.status }));
  });
  return { uploads, answers };
}

class SilentEventSource extends EventTarget {
  close() {
    // Nothing is open.
  }
}

function heldRequestClass(uploads: HeldUpload[]) {
  return class {
    readonly upload: { onprogress?: (event: { loaded: number; total: number }) => void } = {};
    onload?: () => void;
    onerror?: () => void;
    onabort?: () => void;
    onloadend?: () => void;
    status = 0;
    responseText = '';
    readonly #headers: Record<string, string> = {};

    open() {
      // The address is the endpoint's business.
    }

    setRequestHeader(name: string, value: string) {
      this.#headers[name.toLowerCase()] = value;
    }

    abort() {
      this.onabort?.();
      this.onloadend?.();
    }

    send(body: FormData) {
      uploads.push({
        body,
        headers: this.#headers,
        progress: (loaded, total) => this.upload.onprogress?.({ loaded, total }),
        answer: (status, answerBody) => {
          this.status = status;
          this.responseText = JSON.stringify(answerBody);
          this.onload?.();
          this.onloadend?.();
        },
        breakOff: () => {
          this.onerror?.();
          this.onloadend?.();
        },
      });
    }
  };
}
