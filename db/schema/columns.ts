import { timestamp, uuid } from 'drizzle-orm/pg-core';

/** Whose row it is. Every key and every foreign key of a plant's table begins with it. */
export const plantId = () => uuid().notNull();

export const instant = () => timestamp({ withTimezone: true });
