import fc from 'fast-check'

/** Property tests take the same road every time, so that a build server's failure is everybody's; PROPERTY_SEED opens others. */
fc.configureGlobal({ seed: Number(process.env.PROPERTY_SEED ?? 20_261_201) })
