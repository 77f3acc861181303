/** A step in the browser waits for real work: decoding, a whole run. */
jest.setTimeout(120_000);
