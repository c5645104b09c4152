/** One bare address: nothing that could end a header line, start a second recipient or a display name. */
const ONE_ADDRESS = /^[^\s@<>,;:"()[\]\\\p{Cc}]{1,64}@[a-z0-9](?:[a-z0-9-]*[a-z0-9])?(?:\.[a-z0-9](?:[a-z0-9-]*[a-z0-9])?)*$/iu

/**
 * Whether a text is one single mail address and nothing else, so that it cannot name a second recipient or break a header.
 *
 * @param text any text.
 * Source: RFC 5321, 4.1.2, without quoted local parts and address literals.
 */
export function isSingleAddress(text: string): boolean {
  return text.length <= 254 && ONE_ADDRESS.test(text)
}

/** Domain of an address, for Message-IDs; `localhost` when there is none. */
export function domainOf(address: string): string {
  return isSingleAddress(address) ? address.slice(address.lastIndexOf('@') + 1).toLowerCase() : 'localhost'
}
