import bcrypt from 'bcryptjs';

const cost = 10;

/** A verifier for a password or PIN. */
export const hashSecret = (secret: string) => bcrypt.hash(secret, cost);

/** bcrypt reads 72 bytes and would take anything after them for right. */
export const isTooLong = (secret: string) => bcrypt.truncates(secret);

let stranger: Promise<string> | undefined;

/** Compares, and takes as long when there is nothing to compare with: the time says nothing about who has an account. */
export async function isRightSecret(secret: string, hash: string | null): Promise<boolean> {
  stranger ??= hashSecret('nobody has this password');
  const isRight = await bcrypt.compare(secret, hash ?? (await stranger));
  return isRight && hash !== null && !isTooLong(secret);
}
