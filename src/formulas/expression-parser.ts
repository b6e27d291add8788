import { create, type FactoryFunctionMap, parseDependencies } from 'mathjs/number';

/** The expression parser of mathjs alone, for plain numbers. The build bundles this file apart, so that the rest of mathjs is left out. */
export const { parse } = create(parseDependencies as FactoryFunctionMap, {});
