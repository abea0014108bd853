import { mkdirSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';

/** The shapes of SQL that a schema generator emits; `rebuild` is what it does for a changed default. */
const SQL: Record<string, string> = {
	start: `CREATE TABLE parent (id integer PRIMARY KEY, name text);
--> statement-breakpoint
CREATE TABLE child (id integer PRIMARY KEY, parent_id integer REFERENCES parent(id) ON DELETE CASCADE);`,
	rebuild: `PRAGMA foreign_keys=OFF;
--> statement-breakpoint
CREATE TABLE __new_parent (id integer PRIMARY KEY, name text DEFAULT 'x');
--> statement-breakpoint
INSERT INTO __new_parent(id, name) SELECT id, name FROM parent;
--> statement-breakpoint
DROP TABLE parent;
--> statement-breakpoint
ALTER TABLE __new_parent RENAME TO parent;
--> statement-breakpoint
PRAGMA foreign_keys=ON;`,
	loss: `DELETE FROM parent;`
};

/** Writes a migrations folder with the named steps in order. */
export function writeMigrations(folder: string, names: readonly string[]): void {
	mkdirSync(join(folder, 'meta'), { recursive: true });
	const entries = names.map((name, idx) => {
		const tag = `000${idx}_${name}`;
		writeFileSync(join(folder, `${tag}.sql`), SQL[name]!);
		return { idx, version: '6', when: 1_700_000_000_000 + idx, tag, breakpoints: true };
	});
	writeFileSync(
		join(folder, 'meta', '_journal.json'),
		JSON.stringify({ version: '7', dialect: 'sqlite', entries })
	);
}
