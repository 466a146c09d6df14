// starting a server, a browser and a database takes longer than a test of a function may
jest.setTimeout(120_000);
