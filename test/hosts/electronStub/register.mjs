/** Loaded before the built program: maps `electron` to the stub beside this file. */
import { register } from 'node:module';

register('./resolve.mjs', import.meta.url);
