/** Source of a module, bundled for a worker thread (server/workers/thread-code.ts). */
declare module '*?thread-code' {
  const code: string
  export default code
}
