import { hash, verify } from '@node-rs/argon2';

/** Cost of hashing; a memory-hard function makes guessing dear on any hardware. */
export interface PasswordCost {
  memoryCost: number;
  timeCost: number;
  parallelism: number;
}

/** 19 MiB, two passes, one lane: the smallest setting OWASP's password storage sheet gives (from memory). */
export const DEFAULT_PASSWORD_COST: PasswordCost = { memoryCost: 19_456, timeCost: 2, parallelism: 1 };

/** Argon2id. The value of the package's enum, which cannot be read under isolated modules. */
const ARGON2ID = 2;

export class Passwords {
  private readonly nobody: Promise<string>;

  constructor(private readonly cost: PasswordCost = DEFAULT_PASSWORD_COST) {
    this.nobody = this.hash('the password of nobody at all');
  }

  hash(password: string): Promise<string> {
    return hash(password.normalize('NFC'), { ...this.cost, algorithm: ARGON2ID });
  }

  verify(hashed: string, password: string): Promise<boolean> {
    return verify(hashed, password.normalize('NFC'));
  }

  /** Takes as long as `verify`, so that an unknown address cannot be told by the clock. */
  async verifyNobody(password: string): Promise<false> {
    await this.verify(await this.nobody, password);
    return false;
  }
}
