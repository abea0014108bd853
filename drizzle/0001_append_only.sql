CREATE TRIGGER `history_no_update` BEFORE UPDATE ON `history` BEGIN SELECT RAISE(ABORT, 'history: rows are appended, never changed or deleted'); END;
--> statement-breakpoint
CREATE TRIGGER `history_no_delete` BEFORE DELETE ON `history` BEGIN SELECT RAISE(ABORT, 'history: rows are appended, never changed or deleted'); END;
--> statement-breakpoint
CREATE TRIGGER `ledger_no_update` BEFORE UPDATE ON `ledger` BEGIN SELECT RAISE(ABORT, 'metal ledger: rows are appended, never changed or deleted'); END;
--> statement-breakpoint
CREATE TRIGGER `ledger_no_delete` BEFORE DELETE ON `ledger` BEGIN SELECT RAISE(ABORT, 'metal ledger: rows are appended, never changed or deleted'); END;
--> statement-breakpoint
CREATE TRIGGER `measures_no_update` BEFORE UPDATE ON `measures` BEGIN SELECT RAISE(ABORT, 'measures: rows are appended, never changed or deleted'); END;
--> statement-breakpoint
CREATE TRIGGER `measures_no_delete` BEFORE DELETE ON `measures` BEGIN SELECT RAISE(ABORT, 'measures: rows are appended, never changed or deleted'); END;
--> statement-breakpoint
CREATE TRIGGER `piece_steps_no_update` BEFORE UPDATE ON `piece_steps` BEGIN SELECT RAISE(ABORT, 'steps of a piece: rows are appended, never changed or deleted'); END;
--> statement-breakpoint
CREATE TRIGGER `piece_steps_no_delete` BEFORE DELETE ON `piece_steps` BEGIN SELECT RAISE(ABORT, 'steps of a piece: rows are appended, never changed or deleted'); END;
--> statement-breakpoint
CREATE TRIGGER `releases_no_update` BEFORE UPDATE ON `releases` BEGIN SELECT RAISE(ABORT, 'releases: rows are appended, never changed or deleted'); END;
--> statement-breakpoint
CREATE TRIGGER `releases_no_delete` BEFORE DELETE ON `releases` BEGIN SELECT RAISE(ABORT, 'releases: rows are appended, never changed or deleted'); END;
--> statement-breakpoint
CREATE TRIGGER `released_pieces_no_update` BEFORE UPDATE ON `released_pieces` BEGIN SELECT RAISE(ABORT, 'released pieces: rows are appended, never changed or deleted'); END;
--> statement-breakpoint
CREATE TRIGGER `released_pieces_no_delete` BEFORE DELETE ON `released_pieces` BEGIN SELECT RAISE(ABORT, 'released pieces: rows are appended, never changed or deleted'); END;
--> statement-breakpoint
CREATE TRIGGER `pieces_no_update` BEFORE UPDATE ON `pieces` BEGIN SELECT RAISE(ABORT, 'pieces: rows are appended, never changed or deleted'); END;
--> statement-breakpoint
CREATE TRIGGER `pieces_no_delete` BEFORE DELETE ON `pieces` BEGIN SELECT RAISE(ABORT, 'pieces: rows are appended, never changed or deleted'); END;
