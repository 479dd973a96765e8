import * as electron from 'electron';
import { start } from './start.ts';

void start(electron);
