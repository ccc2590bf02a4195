#!/usr/bin/env node
/** The command as the package installs it: plain JavaScript that teaches Node to read the sources, then runs them. */
import { register } from 'tsx/esm/api';

register();
await import('./main.ts');
