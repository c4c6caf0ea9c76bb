import { spawnSync } from 'node:child_process'

/*
 * Every benchmark in turn: npm run bench. The part against JAGS runs where Rscript is installed.
 */
const parts: readonly (readonly [what: string, command: string, ...args: string[]])[] = [
  ['the ferry demo, HTML and PDF', 'npm', 'run', '--silent', 'tareline', '--', 'build', 'sample-data/skerrow-ferries', '--out', 'demo/skerrow-ferries', '--quiet'],
  ['printing', 'npx', 'tsx', 'test/bench/print.ts'],
  ['watching', 'npx', 'tsx', 'test/bench/watch.ts'],
  ['a fit on one core', 'npx', 'tsx', 'test/bench/fit.ts'],
  ['ten times the steps', 'npx', 'tsx', 'test/bench/fit.ts', 'steps'],
  ['many accounts, sealing and verifying', 'npx', 'tsx', 'test/bench/batch.ts'],
  ['intake of 5,000,000 posts', 'npx', 'tsx', 'test/bench/intake.ts'],
  ...(spawnSync('Rscript', ['--version']).status === 0 ? [['against JAGS', 'npx', 'tsx', 'test/bench/fit.ts', 'jags'] as const] : []),
]

for (const [what, command, ...args] of parts) {
  process.stdout.write(`\n${what}\n`)
  const start = performance.now()
  const { status } = spawnSync(command, args, { stdio: ['ignore', 'inherit', 'inherit'] })
  process.stdout.write(`whole process ${((performance.now() - start) / 1000).toFixed(1)} s\n`)
  if (status !== 0) process.exitCode = 1
}
