import connectSessionSequelize from 'connect-session-sequelize';
import type { RequestHandler } from 'express';
import session, { type SessionData } from 'express-session';

import type { Settings } from '../dependencies';
import { hashToken, makeId } from '../ids';
import type { Database } from '../models/database';
import { asKept } from '../models/reader';
import { SESSION_MODEL } from '../models/session-record';

declare module 'express-session' {
  interface SessionData {
    userId: string;
    publicId: string;
    agent: string;
  }
}

export const SESSION_COOKIE = 'moiety.session';
const LIFETIME = 14 * 24 * 60 * 60_000;
const SWEEP_EVERY = 30 * 60_000;
/** How exactly it is known when a session was last used; spares a write at every request. */
const SEEN_EVERY = 60_000;

type Done = (error?: unknown) => void;
const SequelizeStore = connectSessionSequelize(session.Store);

/** Sessions in the same SQLite file: written through the queue, and named by the hash of the cookie's value. */
class QueuedStore extends session.Store {
  private readonly inner: InstanceType<typeof SequelizeStore>;
  private readonly lastSeen = new Map<string, number>();

  constructor(private readonly database: Database) {
    super();
    this.inner = new SequelizeStore({
      db: database.sequelize,
      table: SESSION_MODEL,
      expiration: LIFETIME,
      checkExpirationInterval: -1,
      extendDefaultFields: (defaults, data: SessionData) => ({
        ...defaults,
        userId: data.userId,
        publicId: data.publicId,
        agent: data.agent,
        lastSeenAt: new Date(),
      }),
    });
  }

  override get(sid: string, done: (error: unknown, data?: SessionData | null) => void): void {
    // The column counts: it moves on with every visit, the end noted within the data does not.
    this.database
      .read<{ data: string }>('SELECT data FROM sessions WHERE sid = $sid AND expires > $now', {
        sid: hashToken(sid),
        now: asKept(new Date()),
      })
      .then(
        ([record]) => done(null, record === undefined ? null : (JSON.parse(record.data) as SessionData)),
        (error: unknown) => done(error),
      );
  }

  override set(sid: string, data: SessionData, done?: Done): void {
    this.queued((settle) => this.inner.set(hashToken(sid), data, settle), done);
  }

  override touch(sid: string, data: SessionData, done?: Done): void {
    const key = hashToken(sid);
    const now = Date.now();
    if (now - (this.lastSeen.get(key) ?? 0) < SEEN_EVERY) {
      done?.();
      return;
    }
    this.lastSeen.set(key, now);
    const expires = new Date(data.cookie.expires ?? now + LIFETIME);
    const { SessionRecord } = this.database.models;
    this.database
      .write(() => SessionRecord.update({ expires, lastSeenAt: new Date(now) }, { where: { sid: key } }))
      .then(() => done?.(), done);
  }

  override destroy(sid: string, done?: Done): void {
    this.lastSeen.delete(hashToken(sid));
    this.queued((settle) => this.inner.destroy(hashToken(sid), settle), done);
  }

  private queued(work: (done: Done) => void, done: Done = () => undefined): void {
    const settled = this.database.write(
      () =>
        new Promise<void>((resolve, reject) => {
          work((error) =>
            error ? reject(error instanceof Error ? error : new Error(String(error))) : resolve(),
          );
        }),
    );
    settled.then(() => done(), done);
  }
}

/** Rolling sessions of signed-in people; a visitor has none. */
export function createSessions(database: Database, settings: Settings): RequestHandler {
  return session({
    name: SESSION_COOKIE,
    secret: settings.sessionSecret,
    store: new QueuedStore(database),
    resave: false,
    saveUninitialized: false,
    rolling: true,
    cookie: { httpOnly: true, sameSite: 'lax', secure: settings.secureCookies, maxAge: LIFETIME, path: '/' },
  });
}

/** Takes expired sessions out of the file now and then; returns what stops it. */
export function sweepSessions(database: Database): () => void {
  const sweep = () =>
    void database
      .write(() =>
        database.sequelize.query('DELETE FROM sessions WHERE expires < ?', { replacements: [new Date()] }),
      )
      .catch(() => undefined);
  const timer = setInterval(sweep, SWEEP_EVERY);
  timer.unref();
  return () => clearInterval(timer);
}

/** Signs a person in under a new session name, so that a name known before opens nothing. */
export function beginSession(request: Parameters<RequestHandler>[0], userId: string): Promise<void> {
  return new Promise((resolve, reject) => {
    request.session.regenerate((error: unknown) => {
      if (error) return reject(error instanceof Error ? error : new Error('The session could not be made.'));
      request.session.userId = userId;
      request.session.publicId = makeId();
      request.session.agent = (request.get('user-agent') ?? '').slice(0, 200);
      request.session.save((saveError: unknown) => {
        if (saveError)
          reject(saveError instanceof Error ? saveError : new Error('The session could not be saved.'));
        else resolve();
      });
    });
  });
}

export function endSession(request: Parameters<RequestHandler>[0]): Promise<void> {
  return new Promise((resolve, reject) => {
    request.session.destroy((error: unknown) => {
      if (error) reject(error instanceof Error ? error : new Error('The session could not be ended.'));
      else resolve();
    });
  });
}
