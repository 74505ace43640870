import { createServer } from 'node:net'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { checkServerPort, isLoopback, parsePort } from '../../../server/commands/setup/ports.mjs'

const server = createServer()
let taken = 0

beforeAll(async () => {
  await new Promise<void>(resolve => server.listen(0, '127.0.0.1', resolve))
  const address = server.address()
  taken = address && typeof address === 'object' ? address.port : 0
})

afterAll(() => {
  server.close()
})

describe('parsePort', () => {
  it('takes 3000 where nothing is set', () => {
    expect(parsePort(undefined)).toBe(3000)
    expect(parsePort('')).toBe(3000)
    expect(parsePort('8080')).toBe(8080)
  })

  it.each(['0', '65536', '-1', '3000.5', '3e3', 'http', ' 3000'])('refuses %j in one sentence that names it', (text) => {
    expect(() => parsePort(text)).toThrow(`PORT is "${text}"; it must be a number from 1 to 65535.`)
  })
})

describe('checkServerPort', () => {
  it('names a taken port and how to choose another', async () => {
    await expect(checkServerPort('127.0.0.1', taken)).rejects.toThrow(`Port ${taken} on 127.0.0.1 is taken by another program; stop that, or choose another port: PORT=${taken + 1} npm start`)
  })

  it('names an address that this machine does not have', async () => {
    await expect(checkServerPort('192.0.2.1', 40_000)).rejects.toThrow('HOST is "192.0.2.1", but this machine cannot listen on that address (EADDRNOTAVAIL).')
  })
})

describe('isLoopback', () => {
  it.each(['127.0.0.1', '127.8.9.1', 'localhost', '::1', '[::1]'])('%s reaches this machine only', host => expect(isLoopback(host)).toBe(true))
  it.each(['0.0.0.0', '::', '192.168.1.4', '127.example.org', 'localhost.example.org'])('%s may be reached by others', host => expect(isLoopback(host)).toBe(false))
})
