CREATE TABLE `materials` (
	`id` text PRIMARY KEY NOT NULL,
	`shop_id` text NOT NULL,
	`code` text NOT NULL,
	`metal` text NOT NULL,
	`thickness_nm` integer NOT NULL,
	`gauge_label` text DEFAULT '' NOT NULL,
	`finish` text NOT NULL,
	`colour_name` text DEFAULT '' NOT NULL,
	`colour_code` text DEFAULT '' NOT NULL,
	`grams_per_square_metre` integer NOT NULL,
	`directional` integer DEFAULT false NOT NULL,
	`created_at` integer NOT NULL,
	`archived_at` integer,
	`version` integer DEFAULT 1 NOT NULL,
	FOREIGN KEY (`shop_id`) REFERENCES `shops`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE UNIQUE INDEX `materials_owner` ON `materials` (`shop_id`,`id`);--> statement-breakpoint
CREATE UNIQUE INDEX `materials_code` ON `materials` (`shop_id`,`code`);--> statement-breakpoint
CREATE TABLE `profiles` (
	`id` text PRIMARY KEY NOT NULL,
	`shop_id` text NOT NULL,
	`code` text NOT NULL,
	`name` text NOT NULL,
	`kind` text NOT NULL,
	`shape` text NOT NULL,
	`girth_nm` integer NOT NULL,
	`end_rules` text NOT NULL,
	`joint_kind` text DEFAULT 'lap' NOT NULL,
	`lap_nm` integer NOT NULL,
	`gap_nm` integer NOT NULL,
	`plate_nm` integer NOT NULL,
	`lap_over` text DEFAULT 'left' NOT NULL,
	`concealed` integer DEFAULT false NOT NULL,
	`created_at` integer NOT NULL,
	`archived_at` integer,
	`version` integer DEFAULT 1 NOT NULL,
	FOREIGN KEY (`shop_id`) REFERENCES `shops`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE UNIQUE INDEX `profiles_owner` ON `profiles` (`shop_id`,`id`);--> statement-breakpoint
CREATE UNIQUE INDEX `profiles_code` ON `profiles` (`shop_id`,`code`);--> statement-breakpoint
CREATE TABLE `stock_lengths` (
	`id` text PRIMARY KEY NOT NULL,
	`shop_id` text NOT NULL,
	`profile_id` text NOT NULL,
	`material_id` text NOT NULL,
	`supplier_id` text,
	`nominal_nm` integer NOT NULL,
	`usable_nm` integer NOT NULL,
	`price_cents` integer NOT NULL,
	`priced_on` text NOT NULL,
	`available` integer,
	`bundle_size` integer DEFAULT 1 NOT NULL,
	`bundle_price_cents` integer,
	`standard` integer DEFAULT false NOT NULL,
	`created_at` integer NOT NULL,
	`archived_at` integer,
	`version` integer DEFAULT 1 NOT NULL,
	FOREIGN KEY (`shop_id`) REFERENCES `shops`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`shop_id`,`profile_id`) REFERENCES `profiles`(`shop_id`,`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`shop_id`,`material_id`) REFERENCES `materials`(`shop_id`,`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`shop_id`,`supplier_id`) REFERENCES `suppliers`(`shop_id`,`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE INDEX `stock_lengths_pair` ON `stock_lengths` (`shop_id`,`profile_id`,`material_id`);--> statement-breakpoint
CREATE UNIQUE INDEX `stock_lengths_owner` ON `stock_lengths` (`shop_id`,`id`);--> statement-breakpoint
CREATE TABLE `suppliers` (
	`id` text PRIMARY KEY NOT NULL,
	`shop_id` text NOT NULL,
	`name` text NOT NULL,
	`email` text NOT NULL,
	`phone` text DEFAULT '' NOT NULL,
	`minimum_order_cents` integer DEFAULT 0 NOT NULL,
	`freight_cents` integer DEFAULT 0 NOT NULL,
	`lead_days` integer DEFAULT 0 NOT NULL,
	`created_at` integer NOT NULL,
	`archived_at` integer,
	`version` integer DEFAULT 1 NOT NULL,
	FOREIGN KEY (`shop_id`) REFERENCES `shops`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE UNIQUE INDEX `suppliers_owner` ON `suppliers` (`shop_id`,`id`);--> statement-breakpoint
CREATE TABLE `corners` (
	`id` text PRIMARY KEY NOT NULL,
	`shop_id` text NOT NULL,
	`job_id` text NOT NULL,
	`left_run_id` text NOT NULL,
	`right_run_id` text NOT NULL,
	`kind` text NOT NULL,
	`turn` integer DEFAULT 9000 NOT NULL,
	`carries` text DEFAULT 'left' NOT NULL,
	`plane` text DEFAULT 'finished face' NOT NULL,
	`created_at` integer NOT NULL,
	`deleted_at` integer,
	FOREIGN KEY (`shop_id`) REFERENCES `shops`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`shop_id`,`job_id`) REFERENCES `jobs`(`shop_id`,`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE INDEX `corners_job` ON `corners` (`shop_id`,`job_id`);--> statement-breakpoint
CREATE TABLE `elevations` (
	`id` text PRIMARY KEY NOT NULL,
	`shop_id` text NOT NULL,
	`job_id` text NOT NULL,
	`code` text NOT NULL,
	`name` text NOT NULL,
	`position` integer NOT NULL,
	`created_at` integer NOT NULL,
	`deleted_at` integer,
	`version` integer DEFAULT 1 NOT NULL,
	FOREIGN KEY (`shop_id`) REFERENCES `shops`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`shop_id`,`job_id`) REFERENCES `jobs`(`shop_id`,`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE UNIQUE INDEX `elevations_owner` ON `elevations` (`shop_id`,`id`);--> statement-breakpoint
CREATE UNIQUE INDEX `elevations_code` ON `elevations` (`job_id`,`code`);--> statement-breakpoint
CREATE TABLE `import_rows` (
	`id` text PRIMARY KEY NOT NULL,
	`shop_id` text NOT NULL,
	`import_id` text NOT NULL,
	`row_number` integer NOT NULL,
	`raw` text NOT NULL,
	`problems` text NOT NULL,
	`state` text DEFAULT 'read' NOT NULL,
	`run_id` text,
	FOREIGN KEY (`shop_id`) REFERENCES `shops`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`shop_id`,`import_id`) REFERENCES `imports`(`shop_id`,`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE UNIQUE INDEX `import_rows_number` ON `import_rows` (`import_id`,`row_number`);--> statement-breakpoint
CREATE TABLE `imports` (
	`id` text PRIMARY KEY NOT NULL,
	`shop_id` text NOT NULL,
	`job_id` text NOT NULL,
	`filename` text NOT NULL,
	`sheet` text DEFAULT '' NOT NULL,
	`headers` text NOT NULL,
	`mapping` text NOT NULL,
	`state` text DEFAULT 'mapping' NOT NULL,
	`created_by` text NOT NULL,
	`created_at` integer NOT NULL,
	FOREIGN KEY (`shop_id`) REFERENCES `shops`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`shop_id`,`job_id`) REFERENCES `jobs`(`shop_id`,`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE UNIQUE INDEX `imports_owner` ON `imports` (`shop_id`,`id`);--> statement-breakpoint
CREATE TABLE `jobs` (
	`id` text PRIMARY KEY NOT NULL,
	`shop_id` text NOT NULL,
	`number` text NOT NULL,
	`name` text NOT NULL,
	`customer` text DEFAULT '' NOT NULL,
	`customer_reference` text DEFAULT '' NOT NULL,
	`site` text DEFAULT '' NOT NULL,
	`units` text DEFAULT 'imperial' NOT NULL,
	`due_on` text,
	`waste_allowance_bp` integer DEFAULT 500 NOT NULL,
	`kerf_nm` integer,
	`squaring_hook_nm` integer,
	`squaring_far_nm` integer,
	`min_piece_nm` integer,
	`spec_limit_nm` integer,
	`revision` text DEFAULT '' NOT NULL,
	`created_by` text NOT NULL,
	`created_at` integer NOT NULL,
	`archived_at` integer,
	`deleted_at` integer,
	`version` integer DEFAULT 1 NOT NULL,
	FOREIGN KEY (`shop_id`) REFERENCES `shops`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE UNIQUE INDEX `jobs_owner` ON `jobs` (`shop_id`,`id`);--> statement-breakpoint
CREATE UNIQUE INDEX `jobs_number` ON `jobs` (`shop_id`,`number`);--> statement-breakpoint
CREATE TABLE `measures` (
	`id` text PRIMARY KEY NOT NULL,
	`shop_id` text NOT NULL,
	`job_id` text NOT NULL,
	`run_id` text NOT NULL,
	`kind` text NOT NULL,
	`value_nm` integer NOT NULL,
	`typed` text NOT NULL,
	`note` text DEFAULT '' NOT NULL,
	`taken_by` text NOT NULL,
	`device_at` integer,
	`created_at` integer NOT NULL,
	`op_id` text NOT NULL,
	FOREIGN KEY (`shop_id`) REFERENCES `shops`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`shop_id`,`job_id`) REFERENCES `jobs`(`shop_id`,`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`shop_id`,`run_id`) REFERENCES `runs`(`shop_id`,`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE UNIQUE INDEX `measures_op` ON `measures` (`shop_id`,`op_id`);--> statement-breakpoint
CREATE INDEX `measures_run` ON `measures` (`shop_id`,`run_id`,`created_at`);--> statement-breakpoint
CREATE TABLE `runs` (
	`id` text PRIMARY KEY NOT NULL,
	`shop_id` text NOT NULL,
	`job_id` text NOT NULL,
	`elevation_id` text NOT NULL,
	`unit_id` text,
	`profile_id` text NOT NULL,
	`material_id` text NOT NULL,
	`mark` text NOT NULL,
	`position` integer NOT NULL,
	`level` integer DEFAULT 0 NOT NULL,
	`height_nm` integer,
	`face_nm` integer NOT NULL,
	`face_typed` text NOT NULL,
	`count` integer DEFAULT 1 NOT NULL,
	`left_kind` text DEFAULT 'open' NOT NULL,
	`right_kind` text DEFAULT 'open' NOT NULL,
	`left_end` text,
	`right_end` text,
	`joint_kind` text,
	`lap_nm` integer,
	`gap_nm` integer,
	`choice` text DEFAULT 'even' NOT NULL,
	`min_piece_nm` integer,
	`keep_out` text NOT NULL,
	`fit` text DEFAULT 'over' NOT NULL,
	`source` text DEFAULT 'drawing' NOT NULL,
	`hold` integer DEFAULT true NOT NULL,
	`hold_cleared_by` text,
	`hold_cleared_at` integer,
	`scope` text DEFAULT 'us' NOT NULL,
	`note` text DEFAULT '' NOT NULL,
	`created_at` integer NOT NULL,
	`updated_at` integer NOT NULL,
	`deleted_at` integer,
	`version` integer DEFAULT 1 NOT NULL,
	FOREIGN KEY (`shop_id`) REFERENCES `shops`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`shop_id`,`job_id`) REFERENCES `jobs`(`shop_id`,`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`shop_id`,`elevation_id`) REFERENCES `elevations`(`shop_id`,`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`shop_id`,`profile_id`) REFERENCES `profiles`(`shop_id`,`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`shop_id`,`material_id`) REFERENCES `materials`(`shop_id`,`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE INDEX `runs_job` ON `runs` (`shop_id`,`job_id`,`elevation_id`,`position`);--> statement-breakpoint
CREATE UNIQUE INDEX `runs_owner` ON `runs` (`shop_id`,`id`);--> statement-breakpoint
CREATE TABLE `units` (
	`id` text PRIMARY KEY NOT NULL,
	`shop_id` text NOT NULL,
	`job_id` text NOT NULL,
	`elevation_id` text NOT NULL,
	`mark` text NOT NULL,
	`name` text DEFAULT '' NOT NULL,
	`width_nm` integer,
	`projection_nm` integer,
	`height_nm` integer,
	`created_at` integer NOT NULL,
	`deleted_at` integer,
	`version` integer DEFAULT 1 NOT NULL,
	FOREIGN KEY (`shop_id`) REFERENCES `shops`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`shop_id`,`job_id`) REFERENCES `jobs`(`shop_id`,`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`shop_id`,`elevation_id`) REFERENCES `elevations`(`shop_id`,`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE UNIQUE INDEX `units_owner` ON `units` (`shop_id`,`id`);--> statement-breakpoint
CREATE UNIQUE INDEX `units_mark` ON `units` (`job_id`,`mark`);--> statement-breakpoint
CREATE TABLE `mailbox` (
	`id` text PRIMARY KEY NOT NULL,
	`shop_id` text,
	`message_id` text NOT NULL,
	`from` text NOT NULL,
	`to` text NOT NULL,
	`subject` text NOT NULL,
	`text` text NOT NULL,
	`received_at` integer NOT NULL
);
--> statement-breakpoint
CREATE UNIQUE INDEX `mailbox_message_id_unique` ON `mailbox` (`message_id`);--> statement-breakpoint
CREATE TABLE `mailbox_attachments` (
	`id` text PRIMARY KEY NOT NULL,
	`mailbox_id` text NOT NULL,
	`filename` text NOT NULL,
	`content_type` text NOT NULL,
	`content` blob NOT NULL,
	FOREIGN KEY (`mailbox_id`) REFERENCES `mailbox`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE TABLE `outbox` (
	`id` text PRIMARY KEY NOT NULL,
	`shop_id` text,
	`kind` text NOT NULL,
	`to` text NOT NULL,
	`subject` text NOT NULL,
	`text` text NOT NULL,
	`state` text DEFAULT 'waiting' NOT NULL,
	`attempts` integer DEFAULT 0 NOT NULL,
	`next_at` integer NOT NULL,
	`token` text,
	`lease_until` integer,
	`last_error` text DEFAULT '' NOT NULL,
	`created_at` integer NOT NULL,
	`sent_at` integer
);
--> statement-breakpoint
CREATE INDEX `outbox_next` ON `outbox` (`state`,`next_at`);--> statement-breakpoint
CREATE TABLE `outbox_attachments` (
	`id` text PRIMARY KEY NOT NULL,
	`outbox_id` text NOT NULL,
	`filename` text NOT NULL,
	`content_type` text NOT NULL,
	`content` blob NOT NULL,
	FOREIGN KEY (`outbox_id`) REFERENCES `outbox`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE TABLE `claims` (
	`metal_id` text PRIMARY KEY NOT NULL,
	`shop_id` text NOT NULL,
	`release_id` text NOT NULL,
	`stick_id` text NOT NULL,
	`claimed_by` text NOT NULL,
	`created_at` integer NOT NULL,
	FOREIGN KEY (`shop_id`) REFERENCES `shops`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`shop_id`,`metal_id`) REFERENCES `metal`(`shop_id`,`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`shop_id`,`release_id`) REFERENCES `releases`(`shop_id`,`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`shop_id`,`stick_id`) REFERENCES `planned_sticks`(`shop_id`,`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE UNIQUE INDEX `claims_stick` ON `claims` (`stick_id`);--> statement-breakpoint
CREATE TABLE `ledger` (
	`id` integer PRIMARY KEY AUTOINCREMENT NOT NULL,
	`shop_id` text NOT NULL,
	`at` integer NOT NULL,
	`job_id` text,
	`release_id` text,
	`stick_id` text,
	`metal_id` text,
	`piece_id` text,
	`profile_id` text NOT NULL,
	`material_id` text NOT NULL,
	`account` text NOT NULL,
	`basis` text NOT NULL,
	`length_nm` integer NOT NULL,
	`by` text NOT NULL,
	`reason` text DEFAULT '' NOT NULL,
	FOREIGN KEY (`shop_id`) REFERENCES `shops`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`shop_id`,`profile_id`) REFERENCES `profiles`(`shop_id`,`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`shop_id`,`material_id`) REFERENCES `materials`(`shop_id`,`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE INDEX `ledger_pair` ON `ledger` (`shop_id`,`profile_id`,`material_id`,`at`);--> statement-breakpoint
CREATE INDEX `ledger_job` ON `ledger` (`shop_id`,`job_id`,`basis`);--> statement-breakpoint
CREATE TABLE `metal` (
	`id` text PRIMARY KEY NOT NULL,
	`shop_id` text NOT NULL,
	`kind` text NOT NULL,
	`label` text NOT NULL,
	`profile_id` text NOT NULL,
	`material_id` text NOT NULL,
	`stock_length_id` text,
	`batch` text DEFAULT '' NOT NULL,
	`actual_nm` integer NOT NULL,
	`usable_nm` integer NOT NULL,
	`squaring_hook_nm` integer NOT NULL,
	`squaring_far_nm` integer NOT NULL,
	`place` text DEFAULT '' NOT NULL,
	`state` text DEFAULT 'on hand' NOT NULL,
	`cost_cents` integer DEFAULT 0 NOT NULL,
	`receipt_line_id` text,
	`created_at` integer NOT NULL,
	`ended_at` integer,
	`version` integer DEFAULT 1 NOT NULL,
	FOREIGN KEY (`shop_id`) REFERENCES `shops`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`shop_id`,`profile_id`) REFERENCES `profiles`(`shop_id`,`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`shop_id`,`material_id`) REFERENCES `materials`(`shop_id`,`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE INDEX `metal_pair` ON `metal` (`shop_id`,`profile_id`,`material_id`,`state`);--> statement-breakpoint
CREATE UNIQUE INDEX `metal_owner` ON `metal` (`shop_id`,`id`);--> statement-breakpoint
CREATE UNIQUE INDEX `metal_label` ON `metal` (`shop_id`,`label`);--> statement-breakpoint
CREATE TABLE `order_lines` (
	`id` text PRIMARY KEY NOT NULL,
	`shop_id` text NOT NULL,
	`order_id` text NOT NULL,
	`stock_length_id` text NOT NULL,
	`position` integer NOT NULL,
	`quantity` integer NOT NULL,
	`unit_price_cents` integer NOT NULL,
	`line_cents` integer NOT NULL,
	`purpose` text DEFAULT '' NOT NULL,
	FOREIGN KEY (`shop_id`) REFERENCES `shops`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`shop_id`,`order_id`) REFERENCES `orders`(`shop_id`,`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`shop_id`,`stock_length_id`) REFERENCES `stock_lengths`(`shop_id`,`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE INDEX `order_lines_stock` ON `order_lines` (`shop_id`,`stock_length_id`);--> statement-breakpoint
CREATE UNIQUE INDEX `order_lines_owner` ON `order_lines` (`shop_id`,`id`);--> statement-breakpoint
CREATE TABLE `orders` (
	`id` text PRIMARY KEY NOT NULL,
	`shop_id` text NOT NULL,
	`number` integer NOT NULL,
	`supplier_id` text NOT NULL,
	`state` text DEFAULT 'draft' NOT NULL,
	`need_by` text,
	`deliver_to` text DEFAULT '' NOT NULL,
	`note` text DEFAULT '' NOT NULL,
	`freight_cents` integer DEFAULT 0 NOT NULL,
	`created_by` text NOT NULL,
	`created_at` integer NOT NULL,
	`sent_at` integer,
	`sent_by` text,
	`outbox_id` text,
	`version` integer DEFAULT 1 NOT NULL,
	FOREIGN KEY (`shop_id`) REFERENCES `shops`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`shop_id`,`supplier_id`) REFERENCES `suppliers`(`shop_id`,`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE UNIQUE INDEX `orders_owner` ON `orders` (`shop_id`,`id`);--> statement-breakpoint
CREATE UNIQUE INDEX `orders_number` ON `orders` (`shop_id`,`number`);--> statement-breakpoint
CREATE TABLE `receipt_lines` (
	`id` text PRIMARY KEY NOT NULL,
	`shop_id` text NOT NULL,
	`receipt_id` text NOT NULL,
	`order_line_id` text NOT NULL,
	`received` integer NOT NULL,
	`damaged` integer DEFAULT 0 NOT NULL,
	`batch` text DEFAULT '' NOT NULL,
	`actual_nm` integer NOT NULL,
	`place` text DEFAULT '' NOT NULL,
	FOREIGN KEY (`shop_id`) REFERENCES `shops`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`shop_id`,`receipt_id`) REFERENCES `receipts`(`shop_id`,`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`shop_id`,`order_line_id`) REFERENCES `order_lines`(`shop_id`,`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE INDEX `receipt_lines_line` ON `receipt_lines` (`shop_id`,`order_line_id`);--> statement-breakpoint
CREATE TABLE `receipts` (
	`id` text PRIMARY KEY NOT NULL,
	`shop_id` text NOT NULL,
	`order_id` text NOT NULL,
	`received_by` text NOT NULL,
	`note` text DEFAULT '' NOT NULL,
	`created_at` integer NOT NULL,
	`op_id` text NOT NULL,
	FOREIGN KEY (`shop_id`) REFERENCES `shops`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`shop_id`,`order_id`) REFERENCES `orders`(`shop_id`,`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE UNIQUE INDEX `receipts_op` ON `receipts` (`shop_id`,`op_id`);--> statement-breakpoint
CREATE UNIQUE INDEX `receipts_owner` ON `receipts` (`shop_id`,`id`);--> statement-breakpoint
CREATE TABLE `history` (
	`id` integer PRIMARY KEY AUTOINCREMENT NOT NULL,
	`shop_id` text NOT NULL,
	`at` integer NOT NULL,
	`user_id` text,
	`action` text NOT NULL,
	`entity` text NOT NULL,
	`entity_id` text NOT NULL,
	`job_id` text,
	`summary` text NOT NULL,
	`before` text,
	`after` text,
	`request_id` text DEFAULT '' NOT NULL
);
--> statement-breakpoint
CREATE INDEX `history_shop_at` ON `history` (`shop_id`,`at`);--> statement-breakpoint
CREATE INDEX `history_entity` ON `history` (`shop_id`,`entity`,`entity_id`);--> statement-breakpoint
CREATE TABLE `invitations` (
	`id` text PRIMARY KEY NOT NULL,
	`shop_id` text NOT NULL,
	`email` text NOT NULL,
	`roles` text NOT NULL,
	`token_hash` text NOT NULL,
	`invited_by` text NOT NULL,
	`created_at` integer NOT NULL,
	`expires_at` integer NOT NULL,
	`accepted_at` integer,
	`withdrawn_at` integer,
	FOREIGN KEY (`shop_id`) REFERENCES `shops`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`invited_by`) REFERENCES `users`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE UNIQUE INDEX `invitations_token` ON `invitations` (`token_hash`);--> statement-breakpoint
CREATE TABLE `marks` (
	`key` text PRIMARY KEY NOT NULL,
	`at` integer NOT NULL,
	`demo` integer DEFAULT false NOT NULL
);
--> statement-breakpoint
CREATE TABLE `memberships` (
	`user_id` text NOT NULL,
	`shop_id` text NOT NULL,
	`role` text NOT NULL,
	`created_at` integer NOT NULL,
	PRIMARY KEY(`user_id`, `shop_id`, `role`),
	FOREIGN KEY (`user_id`) REFERENCES `users`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`shop_id`) REFERENCES `shops`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE TABLE `password_resets` (
	`id` text PRIMARY KEY NOT NULL,
	`user_id` text NOT NULL,
	`token_hash` text NOT NULL,
	`created_at` integer NOT NULL,
	`expires_at` integer NOT NULL,
	`used_at` integer,
	FOREIGN KEY (`user_id`) REFERENCES `users`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE UNIQUE INDEX `password_resets_token` ON `password_resets` (`token_hash`);--> statement-breakpoint
CREATE TABLE `preferences` (
	`shop_id` text NOT NULL,
	`user_id` text DEFAULT '' NOT NULL,
	`key` text NOT NULL,
	`value` text NOT NULL,
	PRIMARY KEY(`shop_id`, `user_id`, `key`)
);
--> statement-breakpoint
CREATE TABLE `sessions` (
	`id` text PRIMARY KEY NOT NULL,
	`user_id` text NOT NULL,
	`shop_id` text,
	`user_agent` text DEFAULT '' NOT NULL,
	`created_at` integer NOT NULL,
	`last_seen_at` integer NOT NULL,
	`expires_at` integer NOT NULL,
	`revoked_at` integer,
	FOREIGN KEY (`user_id`) REFERENCES `users`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`shop_id`) REFERENCES `shops`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE INDEX `sessions_user` ON `sessions` (`user_id`);--> statement-breakpoint
CREATE TABLE `shops` (
	`id` text PRIMARY KEY NOT NULL,
	`name` text NOT NULL,
	`currency` text DEFAULT 'USD' NOT NULL,
	`time_zone` text DEFAULT 'America/Chicago' NOT NULL,
	`units` text DEFAULT 'imperial' NOT NULL,
	`precision_nm` integer NOT NULL,
	`kerf_nm` integer NOT NULL,
	`squaring_hook_nm` integer NOT NULL,
	`squaring_far_nm` integer NOT NULL,
	`min_piece_nm` integer NOT NULL,
	`keep_offcut_nm` integer NOT NULL,
	`brake_nm` integer,
	`shear_nm` integer,
	`handling_nm` integer,
	`joint_price_cents` integer DEFAULT 0 NOT NULL,
	`lift_caution_grams` integer DEFAULT 22680 NOT NULL,
	`created_at` integer NOT NULL,
	`version` integer DEFAULT 1 NOT NULL
);
--> statement-breakpoint
CREATE TABLE `users` (
	`id` text PRIMARY KEY NOT NULL,
	`email` text NOT NULL,
	`name` text NOT NULL,
	`password_hash` text,
	`disabled_at` integer,
	`created_at` integer NOT NULL
);
--> statement-breakpoint
CREATE UNIQUE INDEX `users_email_unique` ON `users` (`email`);--> statement-breakpoint
CREATE TABLE `piece_steps` (
	`id` text PRIMARY KEY NOT NULL,
	`shop_id` text NOT NULL,
	`job_id` text NOT NULL,
	`piece_id` text NOT NULL,
	`step` text NOT NULL,
	`done` integer NOT NULL,
	`by` text NOT NULL,
	`device_at` integer,
	`created_at` integer NOT NULL,
	`op_id` text NOT NULL,
	FOREIGN KEY (`shop_id`) REFERENCES `shops`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`shop_id`,`job_id`) REFERENCES `jobs`(`shop_id`,`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`shop_id`,`piece_id`) REFERENCES `pieces`(`shop_id`,`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE UNIQUE INDEX `piece_steps_op` ON `piece_steps` (`shop_id`,`op_id`);--> statement-breakpoint
CREATE INDEX `piece_steps_piece` ON `piece_steps` (`shop_id`,`piece_id`,`step`,`created_at`);--> statement-breakpoint
CREATE TABLE `pieces` (
	`id` text PRIMARY KEY NOT NULL,
	`shop_id` text NOT NULL,
	`job_id` text NOT NULL,
	`run_id` text,
	`profile_id` text NOT NULL,
	`material_id` text NOT NULL,
	`mark` text NOT NULL,
	`kind` text NOT NULL,
	`copy` integer DEFAULT 1 NOT NULL,
	`sequence` integer NOT NULL,
	`length_nm` integer NOT NULL,
	`from_nm` integer NOT NULL,
	`to_nm` integer NOT NULL,
	`left` text NOT NULL,
	`right` text NOT NULL,
	`joint_size_nm` integer,
	`created_at` integer NOT NULL,
	FOREIGN KEY (`shop_id`) REFERENCES `shops`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`shop_id`,`job_id`) REFERENCES `jobs`(`shop_id`,`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE INDEX `pieces_run` ON `pieces` (`shop_id`,`run_id`);--> statement-breakpoint
CREATE INDEX `pieces_mark` ON `pieces` (`shop_id`,`job_id`,`mark`);--> statement-breakpoint
CREATE UNIQUE INDEX `pieces_owner` ON `pieces` (`shop_id`,`id`);--> statement-breakpoint
CREATE TABLE `plan_groups` (
	`id` text PRIMARY KEY NOT NULL,
	`shop_id` text NOT NULL,
	`plan_id` text NOT NULL,
	`profile_id` text NOT NULL,
	`material_id` text NOT NULL,
	`position` integer NOT NULL,
	`status` text NOT NULL,
	`reason` text DEFAULT '' NOT NULL,
	`cost_cents` integer NOT NULL,
	`lengths_used` integer NOT NULL,
	`bound` text NOT NULL,
	`verdict` text NOT NULL,
	`problem` text NOT NULL,
	`impossible` text NOT NULL,
	`first_come_lengths` integer NOT NULL,
	`solve_ms` integer NOT NULL,
	FOREIGN KEY (`shop_id`) REFERENCES `shops`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`shop_id`,`plan_id`) REFERENCES `plans`(`shop_id`,`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`shop_id`,`profile_id`) REFERENCES `profiles`(`shop_id`,`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`shop_id`,`material_id`) REFERENCES `materials`(`shop_id`,`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE UNIQUE INDEX `plan_groups_owner` ON `plan_groups` (`shop_id`,`id`);--> statement-breakpoint
CREATE TABLE `planned_cuts` (
	`id` text PRIMARY KEY NOT NULL,
	`shop_id` text NOT NULL,
	`stick_id` text NOT NULL,
	`piece_id` text NOT NULL,
	`position` integer NOT NULL,
	`at_nm` integer NOT NULL,
	`length_nm` integer NOT NULL,
	FOREIGN KEY (`shop_id`) REFERENCES `shops`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`shop_id`,`stick_id`) REFERENCES `planned_sticks`(`shop_id`,`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`shop_id`,`piece_id`) REFERENCES `pieces`(`shop_id`,`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE INDEX `planned_cuts_stick` ON `planned_cuts` (`shop_id`,`stick_id`);--> statement-breakpoint
CREATE INDEX `planned_cuts_piece` ON `planned_cuts` (`shop_id`,`piece_id`);--> statement-breakpoint
CREATE TABLE `planned_sticks` (
	`id` text PRIMARY KEY NOT NULL,
	`shop_id` text NOT NULL,
	`plan_id` text NOT NULL,
	`group_id` text NOT NULL,
	`number` integer NOT NULL,
	`stock_length_id` text,
	`metal_id` text,
	`nominal_nm` integer NOT NULL,
	`usable_nm` integer NOT NULL,
	`squaring_hook_nm` integer NOT NULL,
	`squaring_far_nm` integer NOT NULL,
	`kerf_nm` integer NOT NULL,
	`left_nm` integer NOT NULL,
	FOREIGN KEY (`shop_id`) REFERENCES `shops`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`shop_id`,`group_id`) REFERENCES `plan_groups`(`shop_id`,`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE INDEX `planned_sticks_plan` ON `planned_sticks` (`shop_id`,`plan_id`);--> statement-breakpoint
CREATE UNIQUE INDEX `planned_sticks_owner` ON `planned_sticks` (`shop_id`,`id`);--> statement-breakpoint
CREATE TABLE `plans` (
	`id` text PRIMARY KEY NOT NULL,
	`shop_id` text NOT NULL,
	`job_id` text NOT NULL,
	`number` integer NOT NULL,
	`state` text DEFAULT 'draft' NOT NULL,
	`settings` text NOT NULL,
	`input_digest` text NOT NULL,
	`created_by` text NOT NULL,
	`created_at` integer NOT NULL,
	`version` integer DEFAULT 1 NOT NULL,
	FOREIGN KEY (`shop_id`) REFERENCES `shops`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`shop_id`,`job_id`) REFERENCES `jobs`(`shop_id`,`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE UNIQUE INDEX `plans_owner` ON `plans` (`shop_id`,`id`);--> statement-breakpoint
CREATE UNIQUE INDEX `plans_number` ON `plans` (`job_id`,`number`);--> statement-breakpoint
CREATE TABLE `released_pieces` (
	`id` text PRIMARY KEY NOT NULL,
	`shop_id` text NOT NULL,
	`release_id` text NOT NULL,
	`job_id` text NOT NULL,
	`piece_id` text NOT NULL,
	`mark` text NOT NULL,
	`change` text NOT NULL,
	`before` text DEFAULT '' NOT NULL,
	`after` text DEFAULT '' NOT NULL,
	FOREIGN KEY (`shop_id`) REFERENCES `shops`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`shop_id`,`release_id`) REFERENCES `releases`(`shop_id`,`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`shop_id`,`piece_id`) REFERENCES `pieces`(`shop_id`,`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE INDEX `released_pieces_job` ON `released_pieces` (`shop_id`,`job_id`,`mark`);--> statement-breakpoint
CREATE UNIQUE INDEX `released_pieces_once` ON `released_pieces` (`release_id`,`piece_id`,`change`);--> statement-breakpoint
CREATE TABLE `releases` (
	`id` text PRIMARY KEY NOT NULL,
	`shop_id` text NOT NULL,
	`job_id` text NOT NULL,
	`plan_id` text NOT NULL,
	`kind` text NOT NULL,
	`revision` text DEFAULT '' NOT NULL,
	`margin_percent` integer DEFAULT 0 NOT NULL,
	`snapshot` text NOT NULL,
	`digest` text NOT NULL,
	`left_out` text NOT NULL,
	`released_by` text NOT NULL,
	`released_at` integer NOT NULL,
	FOREIGN KEY (`shop_id`) REFERENCES `shops`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`shop_id`,`job_id`) REFERENCES `jobs`(`shop_id`,`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`shop_id`,`plan_id`) REFERENCES `plans`(`shop_id`,`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE UNIQUE INDEX `releases_revision` ON `releases` (`job_id`,`kind`,`revision`,`plan_id`);--> statement-breakpoint
CREATE INDEX `releases_job` ON `releases` (`shop_id`,`job_id`,`released_at`);--> statement-breakpoint
CREATE UNIQUE INDEX `releases_owner` ON `releases` (`shop_id`,`id`);--> statement-breakpoint
CREATE TABLE `solves` (
	`id` text PRIMARY KEY NOT NULL,
	`shop_id` text NOT NULL,
	`job_id` text,
	`kind` text NOT NULL,
	`state` text NOT NULL,
	`request` text NOT NULL,
	`result` text,
	`progress` text,
	`plan_id` text,
	`cancel_asked` integer DEFAULT false NOT NULL,
	`error` text DEFAULT '' NOT NULL,
	`requested_by` text NOT NULL,
	`created_at` integer NOT NULL,
	`started_at` integer,
	`ended_at` integer,
	`token` text,
	`lease_until` integer,
	FOREIGN KEY (`shop_id`) REFERENCES `shops`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE INDEX `solves_state` ON `solves` (`state`,`created_at`);--> statement-breakpoint
CREATE INDEX `solves_job` ON `solves` (`shop_id`,`job_id`);--> statement-breakpoint
CREATE UNIQUE INDEX `solves_owner` ON `solves` (`shop_id`,`id`);