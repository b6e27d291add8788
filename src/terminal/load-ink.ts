import { startLayoutEngine } from './ink-caches/layout-engine.js';

/** What is used of ink, and the colour library that ink draws with. */
export interface LoadedInk {
  readonly render: typeof import('ink')['render'];
  readonly chalk: typeof import('chalk')['default'];
}

/**
 * Loads ink. The global `fetch` is out of sight meanwhile: ink's layout engine looks for it to load its WebAssembly, finds that it
 * does not need it, and only the looking costs 20 to 37 ms of the start.
 *
 * Whatever else imports ink must be loaded after this.
 */
export async function loadInk(): Promise<LoadedInk> {
  // The property, not its value: reading the value is what loads fetch.
  const fetchProperty = Object.getOwnPropertyDescriptor(globalThis, 'fetch');
  if (fetchProperty?.configurable) delete (globalThis as { fetch?: unknown }).fetch;
  try {
    const [{ render }, { default: chalk }] = await Promise.all([import('ink'), import('chalk')]);
    await startLayoutEngine();
    return { render, chalk };
  } finally {
    if (fetchProperty?.configurable) Object.defineProperty(globalThis, 'fetch', fetchProperty);
  }
}
