import { Agent, request } from 'node:http';

import type { SessionBody } from '@/contract/account';

export interface Answer {
  readonly status: number;
  readonly body: string;
  readonly milliseconds: number;
}

/** One connection each for as many requests as are in flight. */
const agent = new Agent({ keepAlive: true, maxSockets: 200 });

/** One signed-in person; one request at a time. */
export class Client {
  private readonly jar = new Map<string, string>();
  private token = '';

  constructor(private readonly port: number) {}

  async signIn(email: string, password: string): Promise<void> {
    this.token = this.tokenOf(await this.send('GET', '/session'));
    this.token = this.tokenOf(await this.send('POST', '/session', { email, password }));
  }

  private tokenOf({ status, body }: Answer): string {
    if (status !== 200) throw new Error(`Signing in was answered with ${status}: ${body}`);
    return (JSON.parse(body) as SessionBody).csrfToken;
  }

  send(method: 'GET' | 'POST', path: string, content?: object): Promise<Answer> {
    const text = content === undefined ? '' : JSON.stringify(content);
    const began = performance.now();
    return new Promise((resolve, reject) => {
      const call = request(
        {
          agent,
          port: this.port,
          host: '127.0.0.1',
          method,
          path: `/api${path}`,
          headers: {
            cookie: [...this.jar].map(([name, value]) => `${name}=${value}`).join('; '),
            'x-csrf-token': this.token,
            ...(content === undefined
              ? {}
              : { 'content-type': 'application/json', 'content-length': Buffer.byteLength(text) }),
          },
        },
        (answer) => {
          const parts: Buffer[] = [];
          answer.on('data', (part: Buffer) => parts.push(part));
          answer.on('error', reject);
          answer.on('end', () => {
            const milliseconds = performance.now() - began;
            for (const line of answer.headers['set-cookie'] ?? []) {
              const [name = '', value = ''] = (line.split(';')[0] ?? '').split(/=(.*)/s);
              this.jar.set(name, value);
            }
            resolve({ status: answer.statusCode ?? 0, body: Buffer.concat(parts).toString(), milliseconds });
          });
        },
      );
      call.on('error', reject);
      call.end(text);
    });
  }
}
