import { readFile } from 'node:fs/promises'
import { join } from 'node:path'
import type { Definition } from '../../model/past/definition.ts'
import type { Past, SealedReview } from '../../model/past/past.ts'
import type { IntakeTables } from '../../model/intake/intake-tables.ts'
import type { Account } from '../account/account.ts'
import { readAccount } from '../account/read-account.ts'
import { readIntakeFiles } from '../archive/intake-files.ts'
import { sealedInOrder, type Archive } from '../archive/read-archive.ts'
import { verifyArchive } from '../archive/verify-archive.ts'
import { faultOf } from '../faults/catalogue.ts'
import { InputFault } from '../faults/fault.ts'
import type { Program } from '../program/program.ts'
import { definitionOf } from './definition-of.ts'
import { sealedFigures } from './sealed-figures.ts'

type Seal = ReturnType<typeof sealedInOrder>[number]

/** An archive as a review may look back at it: sound, and up to a seal. */
export interface SealedBefore {
  readonly seals: readonly Seal[]
  /** Hash of the last manifest; null before the first seal. */
  readonly end: string | null
}

/**
 * The archive of an account, hashed again: no figure is taken from one that is not as it was sealed.
 *
 * @throws {InputFault} `archive-unsound`, and everything that is not as it was
 */
export async function soundArchive(folder: string): Promise<SealedBefore> {
  const { archive, faults } = await verifyArchive(join(folder, 'archive'))
  if (faults.length > 0) throw new InputFault([faultOf('archive-unsound', 'archive', {}), ...faults])
  return sealedBefore(archive)
}

/** @param sequence - of the first seal that is not looked back at; absent: all are */
export function sealedBefore(archive: Archive, sequence = Number.POSITIVE_INFINITY): SealedBefore {
  const seals = sealedInOrder(archive).filter(({ manifest }) => manifest.sequence < sequence)
  return { seals, end: seals.at(-1)?.hash ?? null }
}

/**
 * What was sealed of the periods up to the one of these tables, read for the model.
 *
 * @returns null where nothing was
 */
export async function readPast(program: Pick<Program, 'version' | 'model'>, account: Account, { timeline }: IntakeTables, { seals }: SealedBefore): Promise<Past | null> {
  const earlier = seals.filter(({ manifest }) => manifest.period <= timeline.review.name)
  if (earlier.length === 0) return null
  const reviews: SealedReview[] = []
  for (const seal of earlier) reviews.push(await readReview(seal))
  return { definition: definitionOf(account, program.version), program: { version: program.version, model: program.model }, reviews }
}

async function readReview({ name, folder, hash, manifest }: Seal): Promise<SealedReview> {
  const tables = await readIntakeFiles(join(folder, 'intake'))
  return {
    name, period: manifest.period, revision: manifest.revision, reason: manifest.reason, sealedOn: manifest.sealed_at.slice(0, 10),
    madeBy: { version: manifest.program.version, model: manifest.program.model }, manifest: hash,
    told: sealedFigures(await readFile(join(folder, 'findings.json'), 'utf8')), tables,
    definition: await definitionThen(folder, manifest.program.version, tables),
  }
}

/** null where this program can't read the account file of then. */
async function definitionThen(folder: string, version: string, { timeline }: IntakeTables): Promise<Definition | null> {
  try {
    return { ...definitionOf(await readAccount(join(folder, 'account'), { archived: true }), version), base: timeline.base }
  } catch (error) {
    if (error instanceof InputFault) return null
    throw error
  }
}
