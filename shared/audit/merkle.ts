/** SHA-256 or another digest, given by the caller: this module runs in browsers and servers alike. */
export type Digest = (bytes: Uint8Array) => Uint8Array

function join(prefix: number, ...parts: Uint8Array[]): Uint8Array {
  const length = parts.reduce((sum, part) => sum + part.length, 1)
  const joined = new Uint8Array(length)
  joined[0] = prefix
  let at = 1
  for (const part of parts) {
    joined.set(part, at)
    at += part.length
  }
  return joined
}

/**
 * Merkle tree hash of a list of leaves: RFC 6962 section 2.1. Leaves and nodes are told apart by a
 * prefix byte (0x00, 0x01), so that a node can't pass for a leaf. An empty list hashes nothing at all.
 */
export function merkleRoot(leaves: readonly Uint8Array[], digest: Digest): Uint8Array {
  if (leaves.length === 0) return digest(new Uint8Array(0))
  // The RFC splits at the largest power of two below n. Pairing level by level and carrying an odd one up gives the same tree.
  let level = leaves.map(leaf => digest(join(0, leaf)))
  while (level.length > 1) {
    const next: Uint8Array[] = []
    for (let i = 0; i < level.length; i += 2) {
      const right = level[i + 1]
      next.push(right ? digest(join(1, level[i]!, right)) : level[i]!)
    }
    level = next
  }
  return level[0]!
}
