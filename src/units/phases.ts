/** Phases of a stream; a phase code is a place here. */
export const phaseNames = ['none', 'liquid', 'wet', 'vapour', 'supercritical'] as const
