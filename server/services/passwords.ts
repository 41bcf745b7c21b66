import argon2 from 'argon2'

/** argon2id with the least memory that is still advised; about 33 ms. */
const cost = { memoryCost: 19_456, timeCost: 2, parallelism: 1 } as const

export function hashPassword(password: string): Promise<string> {
  return argon2.hash(password, cost)
}

/** Compared with when there is no account (or no password yet), so that both answers take the same time. */
const decoy = hashPassword('no account has this password')

/** True when the password fits; without a hash the same work is done and the answer is false. */
export async function passwordFits(hash: string | null, password: string): Promise<boolean> {
  const fits = await argon2.verify(hash ?? (await decoy), password)
  return hash !== null && fits
}
