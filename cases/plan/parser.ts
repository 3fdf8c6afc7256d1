/** The parser of mathjs alone. Loaded where a plan compares something: the build leaves out what it does not need, and it is still much to load. */
import { create, parseDependencies } from 'mathjs';

export const { parse } = create(parseDependencies);
