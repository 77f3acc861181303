/** Pages by key, not by number: a row that comes or goes in between neither repeats nor hides another. */
import {
  type FindOptions,
  type Includeable,
  type Model,
  type ModelStatic,
  Op,
  type OrderItem,
  type WhereOptions,
} from 'sequelize';
import { z } from 'zod';
import type { ListSort } from '@/shared/contracts/common';
import { invalid } from '../errors';

export interface Found<T> {
  items: T[];
  nextCursor: string | null;
}

interface Sort {
  /** Attribute that is sorted by; ties by id. */
  by: string;
  descending: boolean;
}
interface Options {
  include?: Includeable[];
  attributes?: FindOptions['attributes'];
  sort?: Sort;
}

/** A contract's order of a list, as the pages take it. */
export const sortOf = (sort: ListSort): Sort => ({
  by: sort.replace('-', ''),
  descending: sort.startsWith('-'),
});

const NEWEST: Sort = { by: 'createdAt', descending: true };
const cursorSchema = z.tuple([z.string(), z.union([z.string(), z.number()]), z.uuid()]);

/** One page of `model`, newest first unless `sort` says otherwise. Throws 422 for a cursor that is not its own. */
export async function newestFirst<M extends Model & { id: string }>(
  model: ModelStatic<M>,
  query: { limit: number; cursor?: string | undefined },
  where: WhereOptions,
  { include, attributes, sort = NEWEST }: Options = {},
): Promise<Found<M>> {
  const direction = sort.descending ? 'DESC' : 'ASC';
  const order: OrderItem[] = [
    [sort.by, direction],
    ['id', direction],
  ];
  const after = query.cursor ? readCursor(query.cursor, sort) : null;
  const rows = await model.findAll({
    where: after ? { [Op.and]: [where, beyond(sort, after)] } : where,
    ...(include ? { include } : {}),
    ...(attributes ? { attributes } : {}),
    order,
    limit: query.limit + 1,
  });
  const items = rows.slice(0, query.limit);
  const last = rows.length > query.limit ? items[items.length - 1] : undefined;
  return { items, nextCursor: last ? writeCursor(last, sort) : null };
}

function beyond(sort: Sort, [value, id]: [string | number, string]): WhereOptions {
  const past = sort.descending ? Op.lt : Op.gt;
  return { [Op.or]: [{ [sort.by]: { [past]: value } }, { [sort.by]: value, id: { [past]: id } }] };
}

const nameOf = (sort: Sort) => (sort.descending ? `-${sort.by}` : sort.by);

function writeCursor(row: Model & { id: string }, sort: Sort): string {
  const value: unknown = row.get(sort.by);
  const plain = value instanceof Date ? value.toISOString() : value;
  return Buffer.from(JSON.stringify([nameOf(sort), plain, row.id])).toString('base64url');
}

function readCursor(cursor: string, sort: Sort): [string | number, string] {
  const read = cursorSchema.safeParse(parseJson(Buffer.from(cursor, 'base64url').toString('utf8')));
  if (!read.success || read.data[0] !== nameOf(sort)) {
    const message = 'Not a cursor of this list and order; leave it out to begin at the start.';
    throw invalid(`In the query: cursor: ${message}`, { errors: [{ path: 'cursor', message }] });
  }
  return [read.data[1], read.data[2]];
}

function parseJson(text: string): unknown {
  try {
    return JSON.parse(text);
  } catch {
    return null;
  }
}
