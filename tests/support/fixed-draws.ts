import fc from "fast-check";

/**
 * Properties are tried with the same cases in each run of the suite, so that what passes goes on passing and what fails fails
 * for everybody. `HALFLINE_DRAWS=7 npx vitest run …` tries other cases, for whoever writes a property.
 */
fc.configureGlobal({ seed: Number(process.env.HALFLINE_DRAWS ?? 1) });
