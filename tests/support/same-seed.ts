import fc from 'fast-check'

/** Property tests draw the same cases at every check, so that a red one is about the change; `FC_SEED=$RANDOM npx vitest run --project unit` looks elsewhere. */
fc.configureGlobal({ seed: Number(process.env.FC_SEED ?? 20261201) })
