import { mkdtempSync, readFileSync, statSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';

import { describe, expect, it } from 'vitest';

import { readEnvironment } from '../../server/env';
import { concealTokens } from '../../server/logger';
import { readOrCreateSecret } from '../../server/secret';

describe('settings', () => {
  it('have usable defaults', () => {
    expect(readEnvironment({})).toMatchObject({
      port: 4100,
      demo: false,
      host: '0.0.0.0',
      smtpUrl: null,
      secureCookies: false,
    });
  });

  it('listen on loopback alone in the demo', () => {
    expect(readEnvironment({ DEMO: '1' }).host).toBe('127.0.0.1');
    expect(() => readEnvironment({ DEMO: '1', HOST: '0.0.0.0' })).toThrow(/loopback only/);
    expect(() => readEnvironment({ DEMO: '1', HOST: '0.0.0.0', PORT: 'x' })).toThrow(
      /PORT: [\s\S]*HOST: .*loopback only/,
    );
  });

  it('name every bad variable at once, in words', () => {
    const bad = { PORT: 'many', SMTP_URL: 'http://x', SESSION_SECRET: 'short', LOG_LEVEL: 'loud' };
    expect(() => readEnvironment(bad)).toThrow(
      /PORT: [\s\S]*SMTP_URL: [\s\S]*SESSION_SECRET: [\s\S]*LOG_LEVEL: /,
    );
  });

  it('expect a proxy in front of an https address, unless told otherwise', () => {
    const PUBLIC_URL = 'https://moiety.example.org';
    expect(readEnvironment({ PUBLIC_URL }).trustProxy).toBe(1);
    expect(readEnvironment({ PUBLIC_URL, TRUST_PROXY: '2' }).trustProxy).toBe(2);
    expect(readEnvironment({}).trustProxy).toBe(0);
  });

  it('make cookies secure behind https', () => {
    expect(readEnvironment({ PUBLIC_URL: 'https://moiety.example.org' }).secureCookies).toBe(true);
  });
});

describe('the secret', () => {
  it('is made once and readable by its owner alone', () => {
    const folder = mkdtempSync(join(tmpdir(), 'moiety-secret-'));
    const first = readOrCreateSecret(folder);
    expect(first.length).toBeGreaterThanOrEqual(32);
    expect(readOrCreateSecret(folder)).toBe(first);
    const file = join(folder, 'session-secret');
    expect(statSync(file).mode & 0o777).toBe(0o600);
    expect(readFileSync(file, 'utf8').trim()).toBe(first);
  });
});

describe('logs', () => {
  it('hold no token of an address', () => {
    expect(concealTokens('/api/shared/abc123/copy?x=1')).toBe('/api/shared/[token]/copy?x=1');
    expect(concealTokens('/reset?token=abc123&y=2')).toBe('/reset?token=[token]&y=2');
  });
});
