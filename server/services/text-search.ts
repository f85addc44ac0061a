import { Op, type WhereOptions } from "sequelize";

/** What a list's `q` asks: the start of an id, or every word somewhere in the column. */
export function matchesText(column: string, q: string): WhereOptions {
  const words = q.split(/\s+/).filter((word) => word !== "");
  const inColumn = { [Op.and]: words.map((word) => ({ [column]: { [Op.like]: `%${literal(word)}%` } })) };
  return /^[0-9a-f-]{4,36}$/i.test(q)
    ? { [Op.or]: [{ id: { [Op.like]: `${q.toLowerCase()}%` } }, inColumn] }
    : inColumn;
}

const literal = (text: string): string => text.replaceAll(/[\\%_]/g, "\\$&");
