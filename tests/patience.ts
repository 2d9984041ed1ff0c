/** A busy machine is no failure: what a test waits for may take its time before it counts as missing. */
jest.setTimeout(60_000);
