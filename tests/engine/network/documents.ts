import {
  networkDocumentSchema,
  type NetworkDocument,
  type NetworkDocumentInput,
} from '../../../shared/schemas/network.js';

/** A network document with defaults filled. */
export function network(input: Omit<NetworkDocumentInput, 'format'>): NetworkDocument {
  return networkDocumentSchema.parse({ format: 'trimwick-network/1', ...input });
}

type Link = NonNullable<NetworkDocumentInput['links']>[number];

export function resistor(from: string, to: string, resistanceKPerW: number): Link {
  return { kind: 'resistance', from, to, resistanceKPerW };
}
