import fc from 'fast-check';

// One seed for everybody's `npm test`, so that a red test is red again; FC_SEED=… looks elsewhere.
fc.configureGlobal({ seed: Number(process.env.FC_SEED ?? 20261201) });
