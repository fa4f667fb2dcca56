export { GradientProgram } from './gradient.ts'
export { type Block, Program } from './program.ts'
export { Factors, SparseLU } from './sparse-lu.ts'
export { type Bounds, StepOutcome } from './step.ts'
