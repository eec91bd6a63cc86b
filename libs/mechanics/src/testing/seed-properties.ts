import fc from 'fast-check';

/** Every run tries other cases; the seed is printed so that a failing one can be repeated: FC_SEED=… */
const given = process.env['FC_SEED'];
const seed = given === undefined ? Math.floor(Math.random() * 2 ** 31) : Number(given);
fc.configureGlobal({ seed });
console.log(`Property tests: FC_SEED=${seed}`);
