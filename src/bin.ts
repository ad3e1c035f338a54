#!/usr/bin/env node
import { main } from './cli/main.js';

async function stdin(): Promise<string> {
  const chunks: Buffer[] = [];
  for await (const chunk of process.stdin) chunks.push(chunk as Buffer);
  return Buffer.concat(chunks).toString('utf8');
}

// A reader that has seen enough, such as head, is no fault.
process.stdout.on('error', (error: NodeJS.ErrnoException) => {
  if (error.code !== 'EPIPE') throw error;
  process.exit();
});

const plain = process.env.NO_COLOR !== undefined || process.argv.includes('--no-color');
process.exitCode = await main(process.argv.slice(2), {
  stdout: (text) => process.stdout.write(text),
  stderr: (text) => process.stderr.write(text),
  stdin,
  color: process.stdout.isTTY === true && !plain,
  interactive: process.stderr.isTTY === true,
});
