import { spawnSync } from 'node:child_process'
import { existsSync, readFileSync, rmSync } from 'node:fs'

/** Lint, types, build and every test project, one after the other; ends with the one line that counts them all. */
const report = '.nuxt/test-report.json'
let passed = 0
let failed = 0

function step(title, command, args, environment = {}) {
  console.log(`\n── ${title}`)
  const started = Date.now()
  const result = spawnSync(command, args, { stdio: 'inherit', env: { ...process.env, ...environment } })
  console.log(`── ${title}: ${result.status === 0 ? 'passed' : 'failed'} in ${Math.round((Date.now() - started) / 1000)} s`)
  return result.status === 0
}

function check(title, command, args) {
  if (step(title, command, args)) passed += 1
  else failed += 1
}

function tests(project) {
  rmSync(report, { force: true })
  const good = step(`tests: ${project}`, 'npx', ['vitest', 'run', '--project', project, '--reporter=default', '--reporter=json', `--outputFile.json=${report}`])
  if (!existsSync(report)) {
    failed += 1
    return
  }
  const counts = JSON.parse(readFileSync(report, 'utf8'))
  passed += counts.numPassedTests
  failed += counts.numFailedTests
  if (!good && counts.numFailedTests === 0) failed += 1
}

check('lint', 'npx', ['eslint', '.', '--max-warnings=0'])
check('types', 'npx', ['nuxt', 'typecheck'])
check('build', 'npx', ['nuxt', 'build'])
for (const project of ['unit', 'server', 'nuxt', 'e2e']) tests(project)
console.log(`\n${passed} passed, ${failed} failed`)
process.exit(failed === 0 ? 0 : 1)
