export { type Block, Program } from './program.ts'
export { type Bounds, StepOutcome } from './step.ts'
