import { randomUUID } from 'node:crypto';
import { Client } from 'pg';

/** Does work with a connection as the owner of the tables, outside the pool of the product. */
export async function asOwner<T>(url: string, work: (client: Client) => Promise<T>): Promise<T> {
  const client = new Client({ connectionString: url });
  await client.connect();
  try {
    return await work(client);
  } finally {
    await client.end();
  }
}

export interface FreshDatabase {
  readonly url: string;
  readonly drop: () => Promise<void>;
}

/** An empty database of its own on the server of the suite. */
export async function freshDatabase(): Promise<FreshDatabase> {
  const suite = process.env.DATABASE_URL ?? '';
  const name = `fresh_${randomUUID().replaceAll('-', '')}`;
  await asOwner(suite, (client) => client.query(`create database ${name}`));
  const url = new URL(suite);
  url.pathname = `/${name}`;
  const drop = () =>
    asOwner(suite, async (client) => {
      await client.query(`drop database ${name} with (force)`);
    });
  return { url: url.toString(), drop };
}
