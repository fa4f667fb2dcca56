/** Door for the worker and the command line: everything that solves. */
export { type AskedBalance, balanceOf, balanceOfCase } from './balance/balance-of.ts'
export { createEngine, type Engine, transferables } from './balance/engine.ts'
