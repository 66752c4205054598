/**
 * Column tables to Parquet through DuckDB: a table function hands DuckDB the columns chunk by chunk and COPY writes them.
 * One thread and insertion order kept, so the same table gives the same bytes. The raw bindings do the writing: they load
 * in a sixth of the time that `@duckdb/node-api` takes, which is loaded when something is to be read.
 */
import bindings, { type Connection, type Database, type DataChunk, type LogicalType } from '@duckdb/node-bindings';
import { ABSENT_CODE, type Column, type ColumnTable, type TextColumn } from '../../schemas/columns.js';
import { refuseBrokenNumbers } from './broken-calculation.js';
import { clean } from './write-csv.js';

/** A row of a query, by column. */
export type QueryRow = Readonly<Record<string, unknown>>;

/** One DuckDB in memory. It writes one table at a time: await each call before the next. */
export class ParquetWriter {
  readonly #database: Database;
  readonly #connection: Connection;
  #feed: Feed | null = null;

  static async open(): Promise<ParquetWriter> {
    const config = bindings.create_config();
    bindings.set_config(config, 'threads', '1');
    bindings.set_config(config, 'preserve_insertion_order', 'true');
    const database = await bindings.open(':memory:', config);
    return new ParquetWriter(database, await bindings.connect(database));
  }

  private constructor(database: Database, connection: Connection) {
    this.#database = database;
    this.#connection = connection;
    const columns = bindings.create_table_function();
    bindings.table_function_set_name(columns, 'columns_at_hand');
    bindings.table_function_set_bind(columns, (bind) => {
      const feed = this.#feed!;
      for (const { name, type } of feed.columns) bindings.bind_add_result_column(bind, name, type);
      bindings.bind_set_cardinality(bind, feed.rows, true);
    });
    bindings.table_function_set_init(columns, (init) => {
      bindings.init_set_max_threads(init, 1);
      this.#feed!.next = 0;
    });
    bindings.table_function_set_function(columns, (_, chunk) => copyChunk(this.#feed!, chunk));
    bindings.register_table_function(connection, columns);
  }

  /**
   * Writes one file, replacing what is there. `metadata` becomes the file's key-value metadata.
   * Throws BrokenCalculation before anything is written.
   */
  async write(
    path: string,
    tableName: string,
    table: ColumnTable,
    metadata: Readonly<Record<string, string>>,
  ): Promise<void> {
    refuseBrokenNumbers(tableName, table);
    this.#feed = feedOf(table);
    try {
      const columns = this.#feed.columns.map(({ name, kind }) =>
        kind === 'text' ? `CAST(${identifier(name)} AS VARCHAR) AS ${identifier(name)}` : identifier(name),
      );
      const pairs = Object.entries(metadata).map(([key, value]) => `${identifier(key)}: ${literal(value)}`);
      const keyValues = pairs.length > 0 ? `, KV_METADATA {${pairs.join(', ')}}` : '';
      await bindings.query(
        this.#connection,
        `COPY (SELECT ${columns.join(', ')} FROM columns_at_hand()) TO ${literal(path)} ` +
          `(FORMAT parquet, COMPRESSION snappy, DICTIONARY_SIZE_LIMIT 4096, WRITE_BLOOM_FILTER false${keyValues})`,
      );
    } finally {
      this.#feed = null;
    }
  }

  /** Rows of a query, for reading back what was written. */
  async query(sql: string): Promise<readonly QueryRow[]> {
    const { DuckDBConnection } = await import('@duckdb/node-api');
    const reader = await new DuckDBConnection(this.#connection).runAndReadAll(sql);
    return reader.getRowObjectsJS();
  }

  close(): void {
    bindings.disconnect_sync(this.#connection);
    bindings.close_sync(this.#database);
  }
}

export function literal(text: string): string {
  return `'${text.replaceAll("'", "''")}'`;
}

export function identifier(name: string): string {
  return `"${name.replaceAll('"', '""')}"`;
}

/** What the table function needs of each column: the bytes as DuckDB lays them out, and where cells are absent. */
interface FeedColumn {
  readonly name: string;
  readonly kind: Column['kind'];
  readonly type: LogicalType;
  readonly bytes: ArrayBuffer;
  readonly offset: number;
  readonly width: number;
  readonly absent: Uint8Array | null;
}

interface Feed {
  readonly rows: number;
  readonly columns: readonly FeedColumn[];
  next: number;
}

function feedOf(table: ColumnTable): Feed {
  const columns = Object.entries(table.columns).map(([name, column]): FeedColumn => {
    const { type, cells, absent } = layOut(column);
    const { buffer, byteOffset: offset, BYTES_PER_ELEMENT: width } = cells;
    return { name, kind: column.kind, type, bytes: buffer as ArrayBuffer, offset, width, absent };
  });
  return { rows: table.rows, columns, next: 0 };
}

interface Layout {
  readonly type: LogicalType;
  readonly cells: Float64Array | Int32Array | Uint32Array | Uint16Array | Uint8Array;
  readonly absent: Uint8Array | null;
}

const { DOUBLE, INTEGER, BOOLEAN } = bindings.Type;

function layOut(column: Column): Layout {
  switch (column.kind) {
    case 'number':
      return { type: bindings.create_logical_type(DOUBLE), cells: column.values, absent: column.absent };
    case 'integer':
      return { type: bindings.create_logical_type(INTEGER), cells: column.values, absent: column.absent };
    case 'boolean':
      return { type: bindings.create_logical_type(BOOLEAN), cells: column.values, absent: column.absent };
    case 'text':
      return layOutText(column);
  }
}

/** Text travels as an enumeration, codes of 1, 2 or 4 bytes by the number of words, and becomes text inside DuckDB. */
function layOutText({ codes, words }: TextColumn): Layout {
  const members = new Map<string, number>();
  const memberOf = Uint32Array.from(words, (word) => {
    const text = clean(word);
    const member = members.get(text) ?? members.size;
    members.set(text, member);
    return member;
  });
  if (members.size === 0) members.set('', 0);
  const Codes = members.size <= 0xff ? Uint8Array : members.size <= 0xffff ? Uint16Array : Uint32Array;
  const cells = new Codes(codes.length);
  let absent: Uint8Array | null = null;
  for (let row = 0; row < codes.length; row++) {
    const code = codes[row]!;
    if (code === ABSENT_CODE) {
      absent ??= new Uint8Array(codes.length);
      absent[row] = 1;
    } else cells[row] = memberOf[code]!;
  }
  return { type: bindings.create_enum_type([...members.keys()]), cells, absent };
}

/** At most a vector's 2048 rows; 0 rows end the scan. */
function copyChunk(feed: Feed, chunk: DataChunk): void {
  const from = feed.next;
  const rows = Math.min(bindings.vector_size(), feed.rows - from);
  bindings.data_chunk_set_size(chunk, rows);
  if (rows === 0) return;
  for (let index = 0; index < feed.columns.length; index++) {
    const { bytes, offset, width, absent } = feed.columns[index]!;
    const vector = bindings.data_chunk_get_vector(chunk, index);
    bindings.copy_data_to_vector(vector, 0, bytes, offset + from * width, rows * width);
    const valid = absent === null ? null : validity(absent, from, rows);
    if (valid === null) continue;
    bindings.vector_ensure_validity_writable(vector);
    bindings.copy_data_to_vector_validity(vector, 0, valid.buffer, 0, valid.byteLength);
  }
  feed.next += rows;
}

/** One bit a row, set where the cell is present; null where all are. */
function validity(absent: Uint8Array, from: number, rows: number): Uint8Array<ArrayBuffer> | null {
  let valid: Uint8Array<ArrayBuffer> | null = null;
  for (let row = 0; row < rows; row++) {
    if (absent[from + row] !== 1) continue;
    valid ??= new Uint8Array(8 * Math.ceil(rows / 64)).fill(0xff);
    valid[row >> 3]! &= ~(1 << (row & 7));
  }
  return valid;
}
