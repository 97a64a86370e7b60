'use strict';

/* Progress lines of the scripts behind npm start and npm test. Node built-ins only: runs before anything is installed. */

/** A refusal that is complete in one line: what is wrong and how to mend it. The scripts print it and exit with 1. */
class Refusal extends Error {}

const begun = Date.now();

/** Prints one progress line with the seconds since the script began. */
function say(text) {
  console.log(`${((Date.now() - begun) / 1000).toFixed(1).padStart(6)} s  ${text}`);
}

/** Runs a script's main function; a Refusal becomes exactly one line on standard error. */
function run(main) {
  main().catch((error) => {
    if (error instanceof Refusal) console.error(error.message);
    else console.error(error);
    process.exit(1);
  });
}

module.exports = { Refusal, run, say };
