import { describe, expect, it } from 'vitest'
import { nodeIsSupported } from '../../../server/commands/setup/node-version.mjs'

describe('nodeIsSupported', () => {
  it.each(['20.19.0', '20.20.2', '22.12.0', '24.0.0'])('accepts %s', version => expect(nodeIsSupported(version)).toBe(true))
  it.each(['18.20.4', '20.18.3', '21.7.3', '22.11.0'])('refuses %s', version => expect(nodeIsSupported(version)).toBe(false))
})
