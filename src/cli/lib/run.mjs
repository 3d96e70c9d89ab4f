import { spawn } from 'node:child_process';

/**
 * Runs a program to its end. Its output is kept and, with `show`, passed through.
 * Resolves to `{ code, output }`; a program that is missing gives code 127.
 */
export function run(command, args, { show = false, env = process.env, cwd } = {}) {
  return new Promise((resolve) => {
    const child = spawn(command, args, { env, cwd, stdio: ['ignore', 'pipe', 'pipe'] });
    let output = '';
    const take = (target) => (chunk) => {
      output += chunk;
      if (show) target.write(chunk);
    };
    child.stdout.on('data', take(process.stdout));
    child.stderr.on('data', take(process.stderr));
    const end = () => child.kill('SIGTERM');
    process.on('exit', end);
    const finish = (code) => {
      process.off('exit', end);
      resolve({ code, output });
    };
    child.on('error', (error) => {
      output += error.message;
      finish(127);
    });
    child.on('close', (code, signal) => finish(code ?? (signal ? 128 : 1)));
  });
}

export function lastLines(text, count) {
  return text.trimEnd().split('\n').slice(-count).join('\n');
}
