/** Derivations as modules of numerical functions in programming languages. */
import type { Derivation } from '../derivation.js';
import { C } from './code-c.js';
import { FORTRAN } from './code-fortran.js';
import { JULIA } from './code-julia.js';
import type { Language } from './code-language.js';
import { codeModel } from './code-model.js';
import { PYTHON } from './code-python.js';
import { JAVASCRIPT, TYPESCRIPT } from './code-typescript.js';

/** Every target, in the order in which they are listed. */
export const LANGUAGES: readonly Language[] = [TYPESCRIPT, JAVASCRIPT, C, FORTRAN, PYTHON, JULIA];

/** The TypeScript module that `derive` writes: everything but the Jacobian. */
export const typescriptModule = (d: Derivation): string => TYPESCRIPT.write(codeModel(d, { jacobian: false }));
