import { pathToFileURL } from 'node:url';

/** Calls `main` of a bundled program: node scripts/setup/invoke.mjs BUNDLE [argument …] */
const [, , bundle, ...programArguments] = process.argv;
const { main } = await import(pathToFileURL(bundle).href);
process.exitCode = await main(programArguments);
