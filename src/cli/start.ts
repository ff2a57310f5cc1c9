#!/usr/bin/env node
/** Where the command line starts: what it needs is loaded from here, compiled or not. */
import { keepCompiled } from './compiled.ts';

keepCompiled(__dirname);
void import('./main.ts');
