CREATE TABLE `lost_fix_history` (
	`id` integer PRIMARY KEY AUTOINCREMENT NOT NULL,
	`lost_fix_id` integer NOT NULL,
	`at` integer NOT NULL,
	`by` text,
	`kind` text NOT NULL,
	`text` text NOT NULL,
	FOREIGN KEY (`lost_fix_id`) REFERENCES `lost_fixes`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE INDEX `lost_fix_history_lost_fix` ON `lost_fix_history` (`lost_fix_id`,`kind`);--> statement-breakpoint
CREATE TABLE `lost_fix_photos` (
	`id` integer PRIMARY KEY AUTOINCREMENT NOT NULL,
	`lost_fix_id` integer NOT NULL,
	`at` integer NOT NULL,
	`by` text NOT NULL,
	`file` text NOT NULL,
	`width` integer NOT NULL,
	`height` integer NOT NULL,
	FOREIGN KEY (`lost_fix_id`) REFERENCES `lost_fixes`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE UNIQUE INDEX `lost_fix_photos_file_unique` ON `lost_fix_photos` (`file`);--> statement-breakpoint
CREATE INDEX `lost_fix_photos_lost_fix` ON `lost_fix_photos` (`lost_fix_id`);--> statement-breakpoint
CREATE TABLE `lost_fixes` (
	`id` integer PRIMARY KEY AUTOINCREMENT NOT NULL,
	`kind` text NOT NULL,
	`rover_id` integer,
	`crew_id` integer,
	`mount_point` text,
	`start_at` integer NOT NULL,
	`raised_at` integer NOT NULL,
	`end_at` integer,
	`ending` text,
	`paused_ms` integer DEFAULT 0 NOT NULL,
	`shared_id` integer,
	`flag_at` integer,
	`flag_word` text,
	`flag_note` text,
	`flag_by` text,
	`taken_at` integer,
	`taken_by_user_id` integer,
	`shelved_until` integer,
	`shelved_by` text,
	`shelf_reason` text,
	`diagnosis` text,
	`diagnosis_at_raising` text,
	`is_chattering` integer DEFAULT false NOT NULL,
	`closed_at` integer,
	`closed_by` text,
	`confirmed_cause` text,
	`closing_note` text,
	FOREIGN KEY (`rover_id`) REFERENCES `rovers`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`crew_id`) REFERENCES `crews`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`shared_id`) REFERENCES `lost_fixes`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`taken_by_user_id`) REFERENCES `users`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE INDEX `lost_fixes_rover` ON `lost_fixes` (`rover_id`,`start_at`);--> statement-breakpoint
CREATE INDEX `lost_fixes_crew` ON `lost_fixes` (`crew_id`,`start_at`);--> statement-breakpoint
CREATE INDEX `lost_fixes_mount_point` ON `lost_fixes` (`mount_point`,`start_at`);--> statement-breakpoint
CREATE INDEX `lost_fixes_shared` ON `lost_fixes` (`shared_id`);--> statement-breakpoint
CREATE INDEX `lost_fixes_active` ON `lost_fixes` (`end_at`) WHERE closed_at IS NULL;--> statement-breakpoint
CREATE TABLE `notice_rule_owners` (
	`user_id` integer PRIMARY KEY NOT NULL,
	FOREIGN KEY (`user_id`) REFERENCES `users`(`id`) ON UPDATE no action ON DELETE cascade
);
--> statement-breakpoint
CREATE TABLE `notice_rules` (
	`user_id` integer NOT NULL,
	`subject` text NOT NULL,
	`way` text NOT NULL,
	`after_minutes` integer NOT NULL,
	PRIMARY KEY(`user_id`, `subject`, `way`),
	FOREIGN KEY (`user_id`) REFERENCES `users`(`id`) ON UPDATE no action ON DELETE cascade
);
--> statement-breakpoint
CREATE TABLE `notices` (
	`id` integer PRIMARY KEY AUTOINCREMENT NOT NULL,
	`user_id` integer NOT NULL,
	`lost_fix_id` integer NOT NULL,
	`subject` text NOT NULL,
	`due_key` text NOT NULL,
	`at` integer NOT NULL,
	`text` text NOT NULL,
	`ways` text NOT NULL,
	`seen_at` integer,
	FOREIGN KEY (`user_id`) REFERENCES `users`(`id`) ON UPDATE no action ON DELETE cascade,
	FOREIGN KEY (`lost_fix_id`) REFERENCES `lost_fixes`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE UNIQUE INDEX `notices_due` ON `notices` (`user_id`,`due_key`);--> statement-breakpoint
CREATE INDEX `notices_user` ON `notices` (`user_id`,`id`);--> statement-breakpoint
CREATE TABLE `outbox` (
	`id` integer PRIMARY KEY AUTOINCREMENT NOT NULL,
	`reason` text NOT NULL,
	`to_address` text NOT NULL,
	`subject` text NOT NULL,
	`text` text NOT NULL,
	`html` text,
	`created_at` integer NOT NULL,
	`tries` integer DEFAULT 0 NOT NULL,
	`next_try_at` integer NOT NULL,
	`sent_at` integer,
	`failed_at` integer,
	`last_error` text
);
--> statement-breakpoint
CREATE UNIQUE INDEX `outbox_reason_unique` ON `outbox` (`reason`);--> statement-breakpoint
CREATE INDEX `outbox_waiting` ON `outbox` (`next_try_at`) WHERE sent_at IS NULL AND failed_at IS NULL;--> statement-breakpoint
CREATE TABLE `taps` (
	`user_id` integer NOT NULL,
	`key` text NOT NULL,
	`at` integer NOT NULL,
	`request` text NOT NULL,
	`answer` text NOT NULL,
	PRIMARY KEY(`user_id`, `key`),
	FOREIGN KEY (`user_id`) REFERENCES `users`(`id`) ON UPDATE no action ON DELETE cascade
);
--> statement-breakpoint
CREATE INDEX `taps_at` ON `taps` (`at`);--> statement-breakpoint
ALTER TABLE `firm_settings` ADD `limits` text DEFAULT '{"lostAfterSeconds":30,"regainedAfterSeconds":15,"firstFixWithinMinutes":5,"heardWithinMinutes":10,"maxAgeSeconds":10,"ageClearsSeconds":5,"minSatellites":6,"maxHdop":3,"maxBaselineKm":20}' NOT NULL;--> statement-breakpoint
ALTER TABLE `shift_pauses` ADD `marked_by` text;--> statement-breakpoint
ALTER TABLE `shifts` ADD `started_by` text;--> statement-breakpoint
ALTER TABLE `shifts` ADD `ended_by` text;