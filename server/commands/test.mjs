// npm test: makes a fresh machine ready and runs every check; `npm test -- unit http` runs some.
import { checkNodeVersion } from './setup/node-version.mjs'

checkNodeVersion()
import('./setup/run-tests.mjs').then(({ runTests }) => runTests())
