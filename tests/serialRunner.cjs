const { default: TestRunner } = require('jest-runner');

/** Runs its files one after another, whatever --maxWorkers says: each of them starts a server and a browser. */
module.exports = class SerialRunner extends TestRunner {
  isSerial = true;
};
