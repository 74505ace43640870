import { createServer } from 'node:net'
import { PlainError } from './plain-error.mjs'

function tryListen(host, port) {
  return new Promise((resolve) => {
    const server = createServer()
    server.once('error', error => resolve({ code: error.code, port }))
    server.listen({ host, port, exclusive: true }, () => {
      const { port: got } = server.address()
      server.close(() => resolve({ code: null, port: got }))
    })
  })
}

/** A port that nobody listens on at 127.0.0.1 just now. */
export async function freePort() {
  const { code, port } = await tryListen('127.0.0.1', 0)
  if (code) throw new PlainError(`No loopback port can be opened on this machine (${code}).`)
  return port
}

export async function portIsFree(host, port) {
  return (await tryListen(host, port)).code === null
}

/** @param {string | undefined} text the setting PORT */
export function parsePort(text) {
  if (text === undefined || text === '') return 3000
  const port = Number(text)
  if (!/^\d{1,5}$/.test(text) || port < 1 || port > 65_535) throw new PlainError(`PORT is "${text}"; it must be a number from 1 to 65535.`)
  return port
}

/** @throws PlainError saying why the server could not listen there */
export async function checkServerPort(host, port) {
  const { code } = await tryListen(host, port)
  if (code === null) return
  if (code === 'EADDRINUSE') throw new PlainError(`Port ${port} on ${host} is taken by another program; stop that, or choose another port: PORT=${port < 65_535 ? port + 1 : 3000} npm start`)
  if (code === 'EACCES') throw new PlainError(`Port ${port} may only be opened by root; choose one from 1024 up: PORT=3000 npm start`)
  throw new PlainError(`HOST is "${host}", but this machine cannot listen on that address (${code}).`)
}

/** True where only this machine can reach the address. */
export function isLoopback(host) {
  const bare = host.replace(/^\[|\]$/g, '')
  return bare === 'localhost' || bare === '::1' || /^127(\.\d{1,3}){3}$/.test(bare)
}
