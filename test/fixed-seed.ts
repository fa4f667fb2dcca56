import fc from 'fast-check'

/*
 * Property tests draw the same values in every run, so that a failure can be run again by anybody.
 * SEED=number draws others.
 */
fc.configureGlobal({ seed: Number(process.env.SEED ?? 20261201) })
