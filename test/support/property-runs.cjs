// FOLDWRIGHT_RUNS says how often the kernel's properties are tried; see shared/src/bending/testing/runs.ts.
const fc = require('fast-check');

const wanted = Number(process.env.FOLDWRIGHT_RUNS ?? '');
if (wanted > 0) fc.configureGlobal({ ...fc.readConfigureGlobal(), numRuns: wanted });
