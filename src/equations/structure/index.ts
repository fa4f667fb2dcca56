export { blocksInOrder } from './blocks.ts'
export { type Incidence, incidence, maximumMatching } from './matching.ts'
export { decompose, Part, transpose } from './parts.ts'
