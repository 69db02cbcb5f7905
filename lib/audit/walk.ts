import { chainHash } from './hash';

export interface ChainReport {
  readonly intact: boolean;
  readonly length: number;
  /** Number of the first row that does not follow from those before it, or that is missing. */
  readonly firstBroken: number | null;
  /** What is wrong, as a sentence; null when nothing is. */
  readonly because: string | null;
}

export interface Link {
  readonly seq: number;
  readonly previousHash: string;
  readonly hash: string;
  readonly content: unknown;
}

/** Where a chain must end, by what is kept beside it. */
export interface ChainEnd {
  readonly seq: number;
  readonly hash: string;
}

/** Reads the rows after a number, in order, as many as it likes; none at the end. */
export type ReadLinks = (after: number) => Promise<readonly Link[]>;

/** Follows a chain from its start to its end, batch by batch, and names the first row that is not as it was written. */
export async function walkChain(read: ReadLinks, end: ChainEnd | null): Promise<ChainReport> {
  let previous = '';
  let length = 0;
  for (let links = await read(0); links.length > 0; links = await read(length))
    for (const link of links) {
      if (link.seq !== length + 1)
        return broken(length, link.seq, `The row before it, ${link.seq - 1}, is missing.`);
      if (link.previousHash !== previous || link.hash !== chainHash(previous, link.content))
        return broken(length, link.seq, 'It is not as it was written.');
      previous = link.hash;
      length = link.seq;
    }
  if (end && length < end.seq)
    return broken(length, length + 1, 'It is missing, with all that came after it.');
  if (end && previous !== end.hash) return broken(length, length, 'The chain was written anew.');
  return { intact: true, length, firstBroken: null, because: null };
}

function broken(length: number, firstBroken: number, because: string): ChainReport {
  return { intact: false, length, firstBroken, because };
}
