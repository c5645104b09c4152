import { getQuery, getRouterParams, readBody, setResponseHeader } from 'h3'
import type { EventHandler, H3Event } from 'h3'
import type { z } from 'zod'
import { mayCall } from '#shared/contracts/access'
import type { RouteKey } from '#shared/contracts/access'
import { DomainError } from '../services/domain-error'
import type { Actor, Context, Services } from '../services/context'
import { answerWithError } from './error-response'
import { findActor } from './session'
import { getServices } from './services'
import { checkSameOrigin } from './same-origin'

type Parsed<Schema> = Schema extends z.ZodType ? z.output<Schema> : undefined

interface RouteDefinition<Params, Query, Body, Result> {
  params?: Params
  query?: Query
  /** Contract of a JSON body. A handler that reads its body itself leaves it out. */
  body?: Body
  handle: (input: { context: Context; params: Parsed<Params>; query: Parsed<Query>; body: Parsed<Body>; event: H3Event }) => Promise<Result> | Result
}

interface PublicRouteDefinition<Params, Query, Body, Result> extends Omit<RouteDefinition<Params, Query, Body, Result>, 'handle'> {
  handle: (input: { services: Services; actor: Actor | null; params: Parsed<Params>; query: Parsed<Query>; body: Parsed<Body>; event: H3Event }) => Promise<Result> | Result
}

/**
 * A route for people who are signed in: checks the role against the access table, parses the input by its contracts, runs the handler, and gives every
 * error the one shape.
 */
export function guardedRoute<Result, Params extends z.ZodType | undefined = undefined, Query extends z.ZodType | undefined = undefined, Body extends z.ZodType | undefined = undefined>(
  key: RouteKey,
  definition: RouteDefinition<Params, Query, Body, Result>,
): EventHandler {
  return defineEventHandler(async (event) => {
    try {
      const services = getServices()
      const actor = await findActor(event, services)
      if (!actor) throw new DomainError('signed-out', 'You are signed out. Sign in again; nothing that was saved is lost.')
      if (!mayCall(key, actor.role)) throw new DomainError('forbidden', 'Your role does not allow this. Ask the administrator if it should.')
      const input = await readInput(event, definition)
      setResponseHeader(event, 'cache-control', 'private, no-store')
      return await definition.handle({ ...input, context: { ...services, actor }, event })
    }
    catch (error) {
      return answerWithError(event, error)
    }
  })
}

/** A route that needs no account. */
export function publicRoute<Result, Params extends z.ZodType | undefined = undefined, Query extends z.ZodType | undefined = undefined, Body extends z.ZodType | undefined = undefined>(
  key: RouteKey,
  definition: PublicRouteDefinition<Params, Query, Body, Result>,
): EventHandler {
  return defineEventHandler(async (event) => {
    try {
      if (!mayCall(key, null)) throw new Error(`${key} is not public in the access table`)
      const services = getServices()
      const input = await readInput(event, definition)
      return await definition.handle({ ...input, services, actor: await findActor(event, services), event })
    }
    catch (error) {
      return answerWithError(event, error)
    }
  })
}

async function readInput<Params extends z.ZodType | undefined, Query extends z.ZodType | undefined, Body extends z.ZodType | undefined>(
  event: H3Event,
  contracts: { params?: Params; query?: Query; body?: Body },
) {
  checkSameOrigin(event)
  return {
    params: (contracts.params ? contracts.params.parse(getRouterParams(event, { decode: true })) : undefined) as Parsed<Params>,
    query: (contracts.query ? contracts.query.parse(getQuery(event)) : undefined) as Parsed<Query>,
    body: (contracts.body ? contracts.body.parse(await readJson(event)) : undefined) as Parsed<Body>,
  }
}

async function readJson(event: H3Event): Promise<unknown> {
  try {
    return await readBody(event)
  }
  catch {
    throw new DomainError('invalid-input', 'The request is not readable JSON. Nothing was changed.')
  }
}
