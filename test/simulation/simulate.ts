import { runCoderScenario, type CoderRun } from './coder-study.ts'
import { againstTheMix, drawn, mixOnly, runScenario, type Run } from './study.ts'
import { runSurveyScenario, trueLead, type SurveyRun, type SurveyScenario } from './survey-study.ts'

/*
 * Simulated truth: does adjusted opinion follow it where the raw average does not, do intervals cover, is silence kept where only the mix moves?
 * And of a survey: is a true lead found, is none found where there is none, do forecasts cover? Of a coder that errs: does an audit undo it?
 *
 *   npm run simulate [-- RUNS [SEED [against|drawn|still|leading|unrelated|returning|coder]]]
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

const told: Readonly<Record<SurveyScenario, string>> = {
  leading: 'that follows opinion four weeks later', unrelated: 'that walks on its own', returning: 'of its own that returns to its mean',
}

async function surveyStudy(scenario: SurveyScenario): Promise<void> {
  const found: SurveyRun[] = []
  for (let run = 0; run < runs; run++) found.push(await runSurveyScenario(scenario, seed, run))
  const per = (holds: (run: SurveyRun) => boolean) => (100 * found.filter(holds).length / found.length).toFixed(1)
  const verdicts = [...new Set(found.map(({ verdict }) => verdict))].sort().map((verdict) => `${verdict} ${per((run) => run.verdict === verdict)} %`)
  process.stdout.write(`a survey ${told[scenario]}, ${runs} runs\n  ${verdicts.join(', ')}\n`)
  process.stdout.write(`  best lag within a week of the true one in ${per(({ bestLag }) => bestLag !== null && Math.abs(bestLag - trueLead) <= 1)} %\n`)
  process.stdout.write(`  90 % forecast intervals cover ${(100 * found.reduce((sum, { coverage }) => sum + coverage, 0) / found.length).toFixed(1)} % of waves\n`)
}

for (const scenario of ['leading', 'unrelated', 'returning'] as const) if (only === undefined || only === scenario) await surveyStudy(scenario)

async function coderStudy(): Promise<void> {
  process.stdout.write(`a coder that errs, ${runs} runs: the 90 % interval of the period's opinion\n`)
  for (const labels of [2, 3] as const) {
    for (const [what, codings, perfect] of [['with an audit of 200 a venue', 200, false], ['without an audit', 0, false], ['without one, of a coder that never errs', 0, true]] as const) {
      const found: CoderRun[] = []
      for (let run = 0; run < runs; run++) found.push(await runCoderScenario(labels, codings, perfect, seed, run))
      const bias = found.reduce((sum, { error }) => sum + error, 0) / found.length
      process.stdout.write(`  ${labels} labels, ${what}: covers in ${(100 * found.filter(({ covered }) => covered).length / found.length).toFixed(1)} %, off by ${bias.toFixed(1)} points on average\n`)
    }
  }
}

if (only === undefined || only === 'coder') await coderStudy()
