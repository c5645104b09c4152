import { whenReady } from '../utils/services'

/** Nitro does not wait for asynchronous plugins: the first requests do. */
export default defineEventHandler(() => whenReady())
