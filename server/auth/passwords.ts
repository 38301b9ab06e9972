import { randomBytes } from 'node:crypto';
import { hash, verify } from '@node-rs/argon2';

/** Argon2id with 19 MiB, two passes, one lane: the OWASP Password Storage Cheat Sheet's first setting. */
const settings = { memoryCost: 19_456, timeCost: 2, parallelism: 1 };

/** The same password typed on another keyboard is the same one (NIST SP 800-63B §5.1.1.2). */
const normal = (password: string) => password.normalize('NFKC');

/** Hashes a password for keeping, as a PHC string. */
export const hashPassword = (password: string): Promise<string> => hash(normal(password), settings);

const decoy = hashPassword(randomBytes(32).toString('base64'));

/** Whether it is the password of `kept`. Where nothing is kept it takes the same time and is false. */
export async function checkPassword(kept: string | null | undefined, password: string): Promise<boolean> {
  const matches = await verify(kept ?? (await decoy), normal(password));
  return matches && Boolean(kept);
}
