/** Address of two candidates side by side; `campaign` is the one the reader comes from. */
export function compareCandidatesAddress(
  keys: readonly (string | undefined)[],
  campaign?: string | null,
): string {
  const query = new URLSearchParams({ with: keys.filter((key) => key !== undefined).join(',') })
  if (campaign) query.set('campaign', campaign)
  return `/candidates/compare?${query.toString().replaceAll('%2C', ',')}`
}

/** The keys that an address names: at most two, well-formed, different. */
export function readCompared(address: URLSearchParams): string[] {
  const keys = (address.get('with') ?? '').split(',').filter((key) => /^[0-9a-f]{32}$/.test(key))
  return [...new Set(keys)].slice(0, 2)
}
