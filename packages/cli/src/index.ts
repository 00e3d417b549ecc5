#!/usr/bin/env node
/**
 * The command `staithe`. There is nothing to import here: programs use the packages below.
 * @packageDocumentation
 */
import { main } from './main.js';

process.exitCode = await main(process.argv.slice(2));
