// @ts-check
import { fileURLToPath } from 'node:url'
import importX, { createNodeResolver } from 'eslint-plugin-import-x'
import withNuxt from './.nuxt/eslint.config.mjs'

/**
 * A fence: files may not import what matches the patterns. The map of what may import what stands in DEVELOPERS.md.
 * @param {string[]} files
 * @param {string[]} forbidden
 * @param {string} message
 */
const fence = (files, forbidden, message) => ({
  files,
  rules: { '@typescript-eslint/no-restricted-imports': ['error', { patterns: [{ group: forbidden, message }] }] },
})

const outside = ['vue', 'vue-router', 'nuxt', 'nuxt/*', 'h3', 'nitropack', 'nitropack/*', 'node:*', 'drizzle-orm', 'drizzle-orm/*', 'better-sqlite3', 'zod', 'pdf-lib', 'nodemailer', '#imports', '#shared/contracts/*', '**/server/**', '**/app/**']

export default withNuxt(
  { ignores: ['server/database/migrations/**'] },
  {
    plugins: { 'import-x': importX },
    settings: { 'import-x/resolver-next': [createNodeResolver({ extensions: ['.ts', '.mjs', '.js'], alias: { '#shared': [fileURLToPath(new URL('./shared', import.meta.url))] } })], 'import-x/parsers': { '@typescript-eslint/parser': ['.ts'] } },
  },
  { files: ['shared/**/*.ts', 'server/**/*.ts'], rules: { 'import-x/no-cycle': ['error', { ignoreExternal: true }] } },
  { files: ['**/*.vue'], rules: { 'vue/multi-word-component-names': 'off', 'vue/max-lines-per-block': ['error', { template: 200, script: 200, skipBlankLines: true }] } },
  fence(['shared/compute/**/*.ts'], outside, 'shared/compute imports nothing but itself and small numeric libraries.'),
  fence(['shared/compute/terms/**/*.ts'], [...outside, '../intake/*', '../motor/*', '../torque/*', '../judging/*', '../sampling/*', '../statistics/*', '../lifecycle/*', '../figures/*'], 'terms import nothing.'),
  fence(['shared/compute/intake/**/*.ts', 'shared/compute/motor/**/*.ts', 'shared/compute/statistics/**/*.ts', 'shared/compute/lifecycle/**/*.ts'], [...outside, '**/torque/*', '**/judging/*', '**/sampling/*', '**/figures/*'], 'This room may import terms only.'),
  fence(['shared/compute/torque/**/*.ts'], [...outside, '**/judging/*', '**/sampling/*', '**/lifecycle/*', '**/figures/*'], 'torque may import terms, intake and motor.'),
  fence(['shared/contracts/**/*.ts'], ['vue', 'h3', 'node:*', 'drizzle-orm', '**/server/**', '**/app/**'], 'Contracts import zod and compute types only.'),
  fence(['app/**/*.{ts,vue}'], ['**/server/**', '~~/server/*', 'drizzle-orm', 'drizzle-orm/*', 'better-sqlite3', 'node:*'], 'The app never imports the server.'),
  fence(['server/services/**/*.ts'], ['h3', '#imports', '**/server/utils/*', '../../utils/*', '../utils/*', '**/app/**'], 'Services know no request.'),
  fence(['server/**/*.ts'], ['**/app/**', '~/*'], 'The server never imports the app.'),
  fence(['server/database/seed/generator/**/*.ts'], ['**/compute/torque/*', '**/compute/intake/*', '**/compute/motor/*', '**/compute/judging/*'], 'The generator shares no code with the engine.'),
)
