#!/usr/bin/env node
import { createProgram } from './program.ts';
import { statusOf } from './exit-status.ts';

process.exitCode = await statusOf(() => createProgram().parseAsync(process.argv));
