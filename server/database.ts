import { Sequelize } from 'sequelize';
import { env } from './env';

/** The one connection pool of this process, as the role `app`. */
export const sequelize = new Sequelize(env.databaseUrl, {
  dialect: 'postgres',
  logging: false,
  pool: { max: 10, min: 0, acquire: 10_000, idle: 30_000 },
  dialectOptions: { application_name: 'driftless', statement_timeout: 20_000 },
  define: { underscored: true, timestamps: false },
});
