import type { Endpoint } from '@fieldfare/contracts'
import type { z } from 'zod'

export type QueryValue = string | number | boolean | null | undefined

/** Path parameters by name; plain strings do, since the server checks them. */
export type AddressParams<E extends Endpoint> = E extends { params: infer Schema extends z.ZodObject }
  ? { params: Record<keyof z.output<Schema>, string> }
  : { params?: undefined }

export type AddressQuery<E extends Endpoint> = E extends { query: infer Schema extends z.ZodObject }
  ? { query?: Partial<Record<keyof z.output<Schema>, QueryValue>> }
  : { query?: undefined }

export type AddressOptions<E extends Endpoint> = AddressParams<E> & AddressQuery<E>

export type LooseAddress = {
  params?: Record<string, string> | undefined
  query?: Record<string, QueryValue> | undefined
}

/** The address of a request: parameters filled in, empty query values left out. */
export function endpointAddress(endpoint: Endpoint, { params = {}, query = {} }: LooseAddress): string {
  const path = endpoint.path.replace(/:([A-Za-z]+)/g, (_, name: string) => {
    const value = params[name]
    if (value === undefined || value === '') throw new Error(`${endpoint.id} needs the parameter ${name}`)
    return encodeURIComponent(value)
  })
  const search = new URLSearchParams()
  for (const [name, value] of Object.entries(query)) {
    if (value !== undefined && value !== null && value !== '') search.set(name, String(value))
  }
  return search.size === 0 ? path : `${path}?${search.toString()}`
}

/** The address of a file answer, for a link the browser downloads itself. */
export function downloadAddress<E extends Endpoint>(endpoint: E, options: AddressOptions<E>): string
export function downloadAddress(endpoint: Endpoint, options: LooseAddress): string {
  return endpointAddress(endpoint, options)
}
