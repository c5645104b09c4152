import { checkLogbook } from '../services/logbook/check-logbook'
import { openData } from './open-data'

/** Verifies the whole chain of the logbook; exit 0 only if it is sound. */
const { db, close } = openData()
const check = checkLogbook(db)
close()
console.log(check.ok ? `Sound: ${check.entries} entries follow from one another. Head ${check.headHash}` : `Broken after ${check.entries} entries: ${check.problem!.sentence}`)
process.exitCode = check.ok ? 0 : 1
