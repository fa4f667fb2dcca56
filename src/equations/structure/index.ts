export { blocksInOrder } from './blocks.ts'
export { type Incidence, incidence, type Matching, maximumMatching } from './matching.ts'
export { decompose, Part, type Parts, transpose } from './parts.ts'
