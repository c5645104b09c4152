/** Posts to a route whose answer does not matter beyond its success. The path is a plain string, which spares the types of every route. */
export async function send(path: string, body?: Record<string, unknown>, method: 'POST' | 'PUT' | 'PATCH' | 'DELETE' = 'POST'): Promise<void> {
  await $fetch<unknown, string>(path, { method, body })
}
