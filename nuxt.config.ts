import { threadCode } from './server/workers/thread-code'

const development = process.env.NODE_ENV === 'development'

export default defineNuxtConfig({
  modules: ['@nuxt/eslint', '@nuxtjs/tailwindcss', '@pinia/nuxt', 'nuxt-auth-utils', 'nuxt-security'],
  compatibilityDate: '2026-11-01',
  devtools: { enabled: false },
  telemetry: false,

  app: {
    head: {
      htmlAttrs: { lang: 'en' },
      titleTemplate: '%s · Evenlot',
      meta: [{ name: 'viewport', content: 'width=device-width, initial-scale=1' }],
      link: [{ rel: 'icon', type: 'image/svg+xml', href: '/icon.svg' }],
    },
  },
  css: ['~/assets/css/fonts.css'],
  tailwindcss: { cssPath: ['~/assets/css/tailwind.css', { injectPosition: 'first' }], viewer: false },
  eslint: { config: { stylistic: false } },
  // Who is signed in comes from our own session route; the module's is not asked.
  auth: { loadStrategy: 'none' },

  // Every setting has a NUXT_… variable; a demo needs none of them.
  runtimeConfig: {
    demo: false,
    /** full: about sixty past lots; small: six, for tests and quick starts. */
    demoSize: 'full',
    dataFolder: '.data',
    plantName: 'Kestrel Fold Robotics',
    plantTimeZone: 'Europe/Berlin',
    mail: { host: '', port: 587, secure: false, user: '', password: '', sender: 'incoming@kestrelfold.example' },
    session: { name: 'evenlot', maxAge: 60 * 60 * 12, password: '' },
    public: { origin: 'http://localhost:3000', demo: false },
  },

  security: {
    strict: false,
    headers: {
      contentSecurityPolicy: {
        'default-src': ["'none'"],
        'base-uri': ["'none'"],
        'connect-src': ["'self'"],
        'font-src': ["'self'"],
        'form-action': ["'self'"],
        'frame-ancestors': ["'none'"],
        'frame-src': ["'self'"],
        'img-src': ["'self'", 'data:', 'blob:'],
        'manifest-src': ["'self'"],
        'object-src': ["'none'"],
        'script-src': ["'self'", "'nonce-{{nonce}}'", "'strict-dynamic'", "'wasm-unsafe-eval'"],
        'script-src-attr': ["'none'"],
        'style-src': ["'self'", "'nonce-{{nonce}}'"],
        'style-src-attr': ["'unsafe-inline'"],
        'worker-src': ["'self'"],
        'upgrade-insecure-requests': false,
      },
      crossOriginEmbedderPolicy: 'require-corp',
      referrerPolicy: 'strict-origin-when-cross-origin',
      permissionsPolicy: { camera: ['self'], microphone: [], geolocation: [], fullscreen: ['self'] },
      strictTransportSecurity: development ? false : { maxAge: 15552000, includeSubdomains: true },
    },
    rateLimiter: false,
    requestSizeLimiter: false,
    xssValidator: false,
    corsHandler: false,
    removeLoggers: false,
  },

  nitro: {
    experimental: { tasks: true },
    scheduledTasks: { '* * * * *': ['outbox:send', 'papers:draw'] },
    serverAssets: [
      { baseName: 'fonts', dir: '../fonts' },
      { baseName: 'migrations', dir: './database/migrations' },
    ],
    rollupConfig: { plugins: [threadCode()] },
    typescript: { tsConfig: { include: ['../tests/unit/**/*', '../tests/server/**/*'] } },
    routeRules: {
      '/_nuxt/**': {
        headers: {
          'cross-origin-embedder-policy': 'require-corp',
          'content-security-policy': "default-src 'none'; script-src 'self' 'wasm-unsafe-eval'; connect-src 'self'",
        },
      },
    },
  },
  typescript: {
    strict: true,
    nodeTsConfig: {
      include: ['../*.config.ts', '../tests/e2e/**/*', '../tests/nuxt/vitest.config.ts'],
      compilerOptions: { paths: { '#shared/*': ['../shared/*'] } },
    },
  },
})
