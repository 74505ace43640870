// npm start: makes a fresh machine ready and runs Coldslip until Ctrl-C.
import { checkNodeVersion } from './setup/node-version.mjs'

checkNodeVersion()
// Only now the rest, which an old Node could not even read.
import('./setup/start-coldslip.mjs').then(({ startColdslip }) => startColdslip())
