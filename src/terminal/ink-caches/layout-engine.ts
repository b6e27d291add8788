/** Where the bundled layout engine leaves the function that starts it. */
const starterName = 'holdfast.start-layout-engine';
const starter = Symbol.for(starterName);

/**
 * Starts the layout engine that ink draws with. In the bundle it does not start by itself, since that would make the whole bundle
 * wait (a top-level await); outside of it, it has started when ink was imported, and nothing is to be done.
 */
export async function startLayoutEngine(): Promise<void> {
  await (globalThis as { [starter]?: () => Promise<void> })[starter]?.();
}

const own = { load: './load.js', names: './generated/YGEnums.js' };

/** What stands in the place of the engine's own first file, in the bundle: the names of the engine's files are seen from there. */
export const layoutEngineFile = `
import { loadYoga } from ${JSON.stringify(own.load)};
export * from ${JSON.stringify(own.names)};
let engine;
export { engine as default };
globalThis[Symbol.for(${JSON.stringify(starterName)})] = async () => {
  engine ??= await loadYoga();
};
`;
