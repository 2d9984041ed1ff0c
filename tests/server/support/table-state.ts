import { QueryTypes } from 'sequelize';
import { sequelize } from '@/server/database';

const read = <Row extends object>(sql: string) =>
  sequelize.query<Row>(sql, { type: QueryTypes.SELECT });

/** A fingerprint of every row of every table, with the transaction that wrote it last. */
export async function tableState(): Promise<Record<string, string>> {
  const tables = await read<{ name: string }>(
    "SELECT tablename AS name FROM pg_tables WHERE schemaname = 'public' ORDER BY 1",
  );
  const parts = tables.map(
    ({ name }) =>
      `SELECT '${name}' AS name, count(*) || ' ' ||
         coalesce(md5(string_agg(t.xmin::text || t::text, '|' ORDER BY t::text)), '') AS state
       FROM ${name} t`,
  );
  const rows = await read<{ name: string; state: string }>(parts.join(' UNION ALL '));
  return Object.fromEntries(rows.map(({ name, state }) => [name, state]));
}
