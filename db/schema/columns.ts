import { customType, integer, text, timestamp } from 'drizzle-orm/pg-core'

/** Random names, made by the application; the access check, not the name, is the control. */
export const id = () => text('id').primaryKey()

export const createdAt = () => timestamp('created_at', { withTimezone: true, mode: 'date' }).notNull().defaultNow()

export const at = (name: string) => timestamp(name, { withTimezone: true, mode: 'date' })

/** Counts edits of a row: an update names the version it saw, so that nobody overwrites what they have not read. */
export const version = () => integer('version').notNull().default(1)

export const bytea = customType<{ data: Uint8Array; driverData: Uint8Array }>({ dataType: () => 'bytea' })
