import { hash, verify } from '@node-rs/argon2'

/** Argon2id with the library's parameters (19 MiB, two passes), those of OWASP's password storage advice. */
export const hashPassword = (password: string): Promise<string> => hash(password)

let nobody: Promise<string> | undefined

/**
 * Whether the password fits. Without a hash (no such account, or none set yet) it compares against one that
 * nothing fits, so that the time taken doesn't tell which addresses have an account.
 */
export async function passwordMatches(passwordHash: string | null, password: string): Promise<boolean> {
  nobody ??= hashPassword(crypto.randomUUID())
  const fits = await verify(passwordHash ?? (await nobody), password)
  return passwordHash !== null && fits
}
