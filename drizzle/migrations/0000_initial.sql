CREATE TABLE `audit_entries` (
	`id` integer PRIMARY KEY AUTOINCREMENT NOT NULL,
	`at` integer NOT NULL,
	`actor_user_id` integer,
	`actor_name` text NOT NULL,
	`action` text NOT NULL,
	`subject` text NOT NULL,
	`before` text,
	`after` text
);
--> statement-breakpoint
CREATE TABLE `correction_sources` (
	`id` integer PRIMARY KEY AUTOINCREMENT NOT NULL,
	`name` text NOT NULL,
	`address` text NOT NULL,
	`port` integer NOT NULL,
	`mount_point` text NOT NULL,
	`base_latitude` real,
	`base_longitude` real
);
--> statement-breakpoint
CREATE UNIQUE INDEX `correction_sources_name_unique` ON `correction_sources` (`name`);--> statement-breakpoint
CREATE TABLE `crews` (
	`id` integer PRIMARY KEY AUTOINCREMENT NOT NULL,
	`name` text NOT NULL,
	`phone` text,
	`site_id` integer,
	`hourly_rate` real,
	`pattern` text NOT NULL,
	`active` integer DEFAULT true NOT NULL,
	FOREIGN KEY (`site_id`) REFERENCES `sites`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE UNIQUE INDEX `crews_name_unique` ON `crews` (`name`);--> statement-breakpoint
CREATE TABLE `display_links` (
	`id` integer PRIMARY KEY AUTOINCREMENT NOT NULL,
	`name` text NOT NULL,
	`token_hash` text NOT NULL,
	`created_at` integer NOT NULL,
	`last_opened_at` integer,
	`revoked_at` integer
);
--> statement-breakpoint
CREATE UNIQUE INDEX `display_links_token_hash_unique` ON `display_links` (`token_hash`);--> statement-breakpoint
CREATE TABLE `epochs` (
	`slot` integer NOT NULL,
	`rover_id` integer NOT NULL,
	`time` integer NOT NULL,
	`quality` integer NOT NULL,
	`satellites` integer,
	`hdop` real,
	`age_ms` integer,
	`station_id` integer,
	`latitude` real,
	`longitude` real,
	`altitude_m` real,
	`geoid_separation_m` real,
	`sigma_latitude_m` real,
	`sigma_longitude_m` real,
	`sigma_altitude_m` real,
	PRIMARY KEY(`slot`, `rover_id`, `time`)
) WITHOUT ROWID;
--> statement-breakpoint
CREATE TABLE `firm_settings` (
	`id` integer PRIMARY KEY NOT NULL,
	`firm_name` text NOT NULL,
	`time_zone` text NOT NULL,
	`units` text NOT NULL,
	`currency` text NOT NULL,
	`keep_positions_off_shift` integer NOT NULL
);
--> statement-breakpoint
CREATE TABLE `password_links` (
	`token_hash` text PRIMARY KEY NOT NULL,
	`purpose` text NOT NULL,
	`user_id` integer,
	`created_at` integer NOT NULL,
	`expires_at` integer NOT NULL,
	`used_at` integer,
	FOREIGN KEY (`user_id`) REFERENCES `users`(`id`) ON UPDATE no action ON DELETE cascade
);
--> statement-breakpoint
CREATE TABLE `rover_assignments` (
	`id` integer PRIMARY KEY AUTOINCREMENT NOT NULL,
	`rover_id` integer NOT NULL,
	`crew_id` integer NOT NULL,
	`start_at` integer NOT NULL,
	`end_at` integer,
	FOREIGN KEY (`rover_id`) REFERENCES `rovers`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`crew_id`) REFERENCES `crews`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE INDEX `rover_assignments_rover` ON `rover_assignments` (`rover_id`,`start_at`);--> statement-breakpoint
CREATE INDEX `rover_assignments_crew` ON `rover_assignments` (`crew_id`,`start_at`);--> statement-breakpoint
CREATE TABLE `rover_keys` (
	`id` integer PRIMARY KEY AUTOINCREMENT NOT NULL,
	`rover_id` integer NOT NULL,
	`key_hash` text NOT NULL,
	`hint` text NOT NULL,
	`created_at` integer NOT NULL,
	`last_used_at` integer,
	`revoked_at` integer,
	FOREIGN KEY (`rover_id`) REFERENCES `rovers`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE UNIQUE INDEX `rover_keys_key_hash_unique` ON `rover_keys` (`key_hash`);--> statement-breakpoint
CREATE INDEX `rover_keys_rover` ON `rover_keys` (`rover_id`);--> statement-breakpoint
CREATE TABLE `rovers` (
	`id` integer PRIMARY KEY AUTOINCREMENT NOT NULL,
	`label` text NOT NULL,
	`receiver` text,
	`serial` text,
	`correction_source_id` integer,
	`retired` integer DEFAULT false NOT NULL,
	FOREIGN KEY (`correction_source_id`) REFERENCES `correction_sources`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE UNIQUE INDEX `rovers_label_unique` ON `rovers` (`label`);--> statement-breakpoint
CREATE TABLE `shift_pauses` (
	`id` integer PRIMARY KEY AUTOINCREMENT NOT NULL,
	`shift_id` integer NOT NULL,
	`start_at` integer NOT NULL,
	`end_at` integer,
	`reason` text NOT NULL,
	FOREIGN KEY (`shift_id`) REFERENCES `shifts`(`id`) ON UPDATE no action ON DELETE cascade
);
--> statement-breakpoint
CREATE INDEX `shift_pauses_shift` ON `shift_pauses` (`shift_id`);--> statement-breakpoint
CREATE TABLE `shifts` (
	`id` integer PRIMARY KEY AUTOINCREMENT NOT NULL,
	`crew_id` integer NOT NULL,
	`start_at` integer NOT NULL,
	`end_at` integer,
	FOREIGN KEY (`crew_id`) REFERENCES `crews`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE INDEX `shifts_crew` ON `shifts` (`crew_id`,`start_at`);--> statement-breakpoint
CREATE TABLE `refresh_tokens` (
	`token_hash` text PRIMARY KEY NOT NULL,
	`session_id` text NOT NULL,
	`issued_at` integer NOT NULL,
	`used_at` integer,
	FOREIGN KEY (`session_id`) REFERENCES `sign_in_sessions`(`id`) ON UPDATE no action ON DELETE cascade
);
--> statement-breakpoint
CREATE INDEX `refresh_tokens_session` ON `refresh_tokens` (`session_id`);--> statement-breakpoint
CREATE TABLE `sign_in_sessions` (
	`id` text PRIMARY KEY NOT NULL,
	`user_id` integer,
	`display_link_id` integer,
	`created_at` integer NOT NULL,
	`expires_at` integer NOT NULL,
	`ended_at` integer,
	`end_reason` text,
	FOREIGN KEY (`user_id`) REFERENCES `users`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`display_link_id`) REFERENCES `display_links`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE INDEX `sign_in_sessions_user` ON `sign_in_sessions` (`user_id`);--> statement-breakpoint
CREATE TABLE `sites` (
	`id` integer PRIMARY KEY AUTOINCREMENT NOT NULL,
	`name` text NOT NULL,
	`latitude` real,
	`longitude` real,
	`note` text,
	`active` integer DEFAULT true NOT NULL
);
--> statement-breakpoint
CREATE UNIQUE INDEX `sites_name_unique` ON `sites` (`name`);--> statement-breakpoint
CREATE TABLE `spans` (
	`rover_id` integer NOT NULL,
	`start_at` integer NOT NULL,
	`end_at` integer NOT NULL,
	`state` text NOT NULL,
	PRIMARY KEY(`rover_id`, `start_at`)
) WITHOUT ROWID;
--> statement-breakpoint
CREATE TABLE `users` (
	`id` integer PRIMARY KEY AUTOINCREMENT NOT NULL,
	`name` text NOT NULL,
	`email` text NOT NULL,
	`password_hash` text,
	`role` text NOT NULL,
	`crew_id` integer,
	`active` integer DEFAULT true NOT NULL,
	`created_at` integer NOT NULL,
	`last_sign_in_at` integer,
	FOREIGN KEY (`crew_id`) REFERENCES `crews`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE UNIQUE INDEX `users_email_unique` ON `users` (`email`);