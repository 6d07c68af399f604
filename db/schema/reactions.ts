import { foreignKey, jsonb, pgTable, text, unique } from 'drizzle-orm/pg-core'
import { createdAt, id, version } from './columns'
import { users } from './people'

export const reactions = pgTable(
  'reactions',
  {
    id: id(),
    code: text('code').notNull(),
    name: text('name').notNull(),
    keyReactant: text('key_reactant').notNull(),
    /** list of stoichiometric records, the main step first */
    steps: jsonb('steps').notNull(),
    /** user-given thermochemistry where the built-in polynomials do not serve; null uses them */
    thermochemistry: jsonb('thermochemistry'),
    notes: text('notes').notNull().default(''),
    createdBy: text('created_by').notNull(),
    createdAt: createdAt(),
    version: version(),
  },
  (t) => [
    unique('reactions_code_unique').on(t.code),
    foreignKey({ name: 'reactions_created_by_fkey', columns: [t.createdBy], foreignColumns: [users.id] }),
  ],
)
