import type { EntityManager } from 'typeorm';
import { searchText } from '../common/search-words';

interface FilingRow {
  id: string;
  number: number;
  fileName: string;
  note: string;
  unitSearch: string | null;
  condition: string | null;
  rig: string | null;
}

/**
 * Brings the search text and the unit's sort key of captures up to date, after a capture was filed or a unit, a rig or a
 * condition was renamed.
 *
 * @param column - which captures: those whose column holds the id
 */
export async function refreshFiling(
  tx: EntityManager,
  column: 'id' | 'unit_id' | 'condition_id' | 'rig_id',
  id: string,
): Promise<void> {
  const rows = await tx.query<FilingRow[]>(
    `SELECT c.id, c.number, c.file_name AS "fileName", c.note, u.search AS "unitSearch",
       k.name AS condition, g.name AS rig
     FROM capture AS c LEFT JOIN unit AS u ON u.id = c.unit_id
       LEFT JOIN unit_condition AS k ON k.id = c.condition_id LEFT JOIN rig AS g ON g.id = c.rig_id
     WHERE c.${column} = $1 ORDER BY c.id FOR UPDATE OF c`,
    [id],
  );
  await tx.query(
    `UPDATE capture AS c SET search = v.search, unit_key = v.unit_key
     FROM unnest($1::uuid[], $2::text[], $3::text[]) AS v (id, search, unit_key) WHERE c.id = v.id`,
    [rows.map((row) => row.id), rows.map(searchTextOf), rows.map((row) => row.unitSearch ?? '')],
  );
}

function searchTextOf({ number, fileName, note, unitSearch, condition, rig }: FilingRow): string {
  return searchText([`#${number}`, fileName, unitSearch, condition, rig, note]);
}
