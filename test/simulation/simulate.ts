import { againstTheMix, drawn, mixOnly, runScenario, type Run } from './study.ts'

/*
 * Simulated truth: does adjusted opinion follow it where the raw average does not, do intervals cover, is silence kept where only the mix moves?
 *
 *   npm run simulate [-- RUNS [SEED [against|drawn|still]]]
 */
const runs = Number(process.argv[2] ?? 200)
const seed = Number(process.argv[3] ?? 11)
const only = process.argv[4]

async function study(scenario: typeof drawn): Promise<readonly Run[]> {
  const found: Run[] = []
  for (let run = 0; run < runs; run++) found.push(await runScenario(scenario, seed, run))
  return found
}

const share = (of: readonly Run[], holds: (run: Run) => boolean) => (100 * of.filter(holds).length / of.length).toFixed(1)
const median = (values: readonly number[]) => [...values].sort((a, b) => a - b)[Math.floor(values.length / 2)].toFixed(3)

if (only === undefined || only === 'against') {
  const against = await study(againstTheMix)
  process.stdout.write(`drift and mix work against opinion, ${runs} runs\n`)
  process.stdout.write(`  correlation with true opinion, median: adjusted ${median(against.map((run) => run.adjusted))}, raw ${median(against.map((run) => run.raw))}\n`)
  process.stdout.write(`  0.95 or more in ${share(against, (run) => run.adjusted >= 0.95)} % of runs for adjusted, in ${share(against, (run) => run.raw >= 0.95)} % for raw\n`)
}
if (only === undefined || only === 'drawn') {
  const moving = await study(drawn)
  process.stdout.write(`opinion, drift and mix drawn, ${runs} runs\n`)
  process.stdout.write(`  the 90 % interval of the last change covers in ${share(moving, (run) => run.covered)} %; a change is announced in ${share(moving, (run) => run.announced)} %\n`)
}
if (only === undefined || only === 'still') {
  const still = await study(mixOnly)
  process.stdout.write(`only the mix moves, ${runs} runs\n`)
  process.stdout.write(`  a change is announced in ${share(still, (run) => run.announced)} %; the interval covers in ${share(still, (run) => run.covered)} %\n`)
}
