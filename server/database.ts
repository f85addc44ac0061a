import { QueryTypes, Sequelize } from "sequelize";
import { SequelizeStorage, Umzug } from "umzug";
import { migrations } from "./migrations/index.ts";
import { defineModels, type Models } from "./models/index.ts";

export interface Migration {
  readonly up: (database: Sequelize) => Promise<void>;
  readonly down: (database: Sequelize) => Promise<void>;
}

export interface Database {
  readonly sequelize: Sequelize;
  readonly models: Models;
}

/** How long a request waits for a free connection before it is told that the service is busy. */
const ACQUIRE_MS = 5_000;

/** Opens the pool; the first query connects. Times are UTC, DECIMAL and BIGINT come as text, never rounded in silence. */
export function openDatabase(url: string): Database {
  const sequelize = new Sequelize(url, {
    dialect: "mariadb",
    logging: false,
    timezone: "+00:00",
    pool: { max: 10, min: 0, idle: 10_000, acquire: ACQUIRE_MS },
    define: { timestamps: false, freezeTableName: true },
    dialectOptions: {
      bigNumberStrings: true,
      connectTimeout: ACQUIRE_MS,
      socketTimeout: 60_000,
      charset: "utf8mb4",
    },
  });
  return { sequelize, models: defineModels(sequelize) };
}

function migrator(sequelize: Sequelize) {
  return new Umzug({
    migrations: Object.entries(migrations).map(([name, { up, down }]) => ({
      name,
      up: () => up(sequelize),
      down: () => down(sequelize),
    })),
    storage: new SequelizeStorage({ sequelize, tableName: "migrations" }),
    logger: undefined,
  });
}

/** Brings the tables up to date; two processes that start together wait for each other. Returns the names it ran. */
export async function migrate({ sequelize }: Database): Promise<string[]> {
  return sequelize.transaction(async (transaction) => {
    await sequelize.query("SELECT GET_LOCK('borewright-migrations', 60)", {
      transaction,
      type: QueryTypes.SELECT,
    });
    try {
      return (await migrator(sequelize).up()).map((migration) => migration.name);
    } finally {
      await sequelize.query("SELECT RELEASE_LOCK('borewright-migrations')", {
        transaction,
        type: QueryTypes.SELECT,
      });
    }
  });
}

/** Takes every table away again: the way back of each migration, newest first. */
export async function unmigrate({ sequelize }: Database): Promise<void> {
  await migrator(sequelize).down({ to: 0 });
}

/** Whether the database answers and no migration is waiting. */
export async function databaseChecks({
  sequelize,
}: Database): Promise<{ database: boolean; migrations: boolean }> {
  try {
    return { database: true, migrations: (await migrator(sequelize).pending()).length === 0 };
  } catch {
    return { database: false, migrations: false };
  }
}
