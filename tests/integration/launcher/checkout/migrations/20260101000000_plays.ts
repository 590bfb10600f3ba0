import type { Knex } from 'knex'

export async function up(database: Knex): Promise<void> {
  await database.schema.createTable('plays', (table) => {
    table.increments('id')
    table.text('title').notNullable()
  })
}

export async function down(database: Knex): Promise<void> {
  await database.schema.dropTable('plays')
}
