import { Injectable } from '@nestjs/common';
import { hash, verify, type Options } from '@node-rs/argon2';
import { randomBytes } from 'node:crypto';

/** argon2id, 19 MiB, two passes, one lane: the OWASP Password Storage cheat sheet's first choice. */
const options: Options = { algorithm: 2, memoryCost: 19_456, timeCost: 2, parallelism: 1 };

@Injectable()
export class Passwords {
  /** A hash that no password opens, so that an unknown address costs the same as a wrong password. */
  private readonly nobody = hash(randomBytes(32), options);

  hash(password: string): Promise<string> {
    return hash(canonical(password), options);
  }

  /** Exactly one argon2 verification, whether there is a hash or not. */
  async verify(stored: string | null, password: string): Promise<boolean> {
    const isRight = await verify(stored ?? (await this.nobody), canonical(password));
    return isRight && stored !== null;
  }
}

/** One form for what different keyboards type for the same character (NIST SP 800-63B). Spaces stay. */
const canonical = (password: string) => password.normalize('NFKC');
