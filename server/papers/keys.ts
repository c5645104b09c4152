import { createHash, createPrivateKey, createPublicKey, generateKeyPairSync, sign, verify } from 'node:crypto'
import { chmodSync, existsSync, mkdirSync, readFileSync, writeFileSync } from 'node:fs'
import { join } from 'node:path'

/** Signs records with Ed25519. */
export interface RecordSigner {
  /** First 16 hexadecimal digits of the SHA-256 of the public key (SPKI, DER). */
  keyId: string
  publicKeyPem: string
  /** Signature over the bytes, base64. */
  sign: (bytes: Uint8Array) => string
}

const FILE = 'record-signing-key.pem'

/**
 * The plant's signing key: made at first start, kept in the data folder, readable by its owner only.
 *
 * Source: RFC 8032 (Ed25519), RFC 8410 (key encoding).
 */
export function loadOrCreateSigner(folder: string): RecordSigner {
  mkdirSync(folder, { recursive: true })
  const path = join(folder, FILE)
  if (!existsSync(path)) {
    const pair = generateKeyPairSync('ed25519')
    writeFileSync(path, pair.privateKey.export({ type: 'pkcs8', format: 'pem' }), { mode: 0o600, flag: 'wx' })
    chmodSync(path, 0o600)
  }
  const privateKey = createPrivateKey(readFileSync(path))
  const publicKey = createPublicKey(privateKey)
  return {
    keyId: createHash('sha256').update(publicKey.export({ type: 'spki', format: 'der' })).digest('hex').slice(0, 16),
    publicKeyPem: publicKey.export({ type: 'spki', format: 'pem' }).toString(),
    sign: bytes => sign(null, bytes, privateKey).toString('base64'),
  }
}

/** Whether the signature over these bytes was made with that key. */
export function verifySignature(bytes: Uint8Array, signature: string, publicKeyPem: string): boolean {
  return verify(null, bytes, createPublicKey(publicKeyPem), Buffer.from(signature, 'base64'))
}
