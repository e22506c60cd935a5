import { request } from 'node:http';
import { setTimeout as delay } from 'node:timers/promises';

export interface LiveReader {
  status: number;
  contentType: string;
  /** Events heard so far, with `hello` among them. */
  heard: Array<{ type: string; [key: string]: unknown }>;
  isEnded(): boolean;
  /** Waits for something to become true of the stream; throws after 5 s. */
  until(isTrue: () => boolean): Promise<void>;
  close(): void;
}

/** Opens `/api/v1/live` with a browser's cookies and reads it as it comes. */
export function openLiveReader(address: string, cookie: string): Promise<LiveReader> {
  return new Promise((resolve, reject) => {
    const asked = request(`${address}/api/v1/live`, { headers: { cookie } }, (response) => {
      const heard: LiveReader['heard'] = [];
      let ended = false;
      let rest = '';
      response.setEncoding('utf8');
      response.on('data', (text: string) => {
        const blocks = (rest + text).split('\n\n');
        rest = blocks.pop() ?? '';
        for (const block of blocks) {
          const data = /^data: (.*)$/m.exec(block)?.[1];
          if (data) heard.push(JSON.parse(data));
        }
      });
      const end = () => {
        ended = true;
      };
      response.on('close', end).on('error', end);
      resolve({
        status: response.statusCode ?? 0,
        contentType: String(response.headers['content-type']),
        heard,
        isEnded: () => ended,
        async until(isTrue) {
          const deadline = Date.now() + 5000;
          while (!isTrue()) {
            if (Date.now() > deadline) throw new Error(`Heard only ${JSON.stringify(heard)}.`);
            await delay(10);
          }
        },
        close: () => asked.destroy(),
      });
    });
    asked.on('error', reject);
    asked.end();
  });
}
