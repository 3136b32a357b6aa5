CREATE TABLE `figures_to_do` (
	`rover_id` integer NOT NULL,
	`start_at` integer NOT NULL,
	`end_at` integer NOT NULL,
	PRIMARY KEY(`rover_id`, `start_at`)
);
--> statement-breakpoint
CREATE TABLE `holidays` (
	`day` text PRIMARY KEY NOT NULL,
	`name` text NOT NULL
);
--> statement-breakpoint
CREATE TABLE `shift_figures` (
	`rover_id` integer NOT NULL,
	`shift_start` integer NOT NULL,
	`day` text NOT NULL,
	`week` text NOT NULL,
	`crew_id` integer NOT NULL,
	`start_at` integer NOT NULL,
	`end_at` integer,
	`basis` text NOT NULL,
	`mount_point` text,
	`fixed_ms` integer NOT NULL,
	`float_ms` integer NOT NULL,
	`code_ms` integer NOT NULL,
	`none_ms` integer NOT NULL,
	`silent_ms` integer NOT NULL,
	`within_tolerance_ms` integer NOT NULL,
	`first_fix_ms` integer,
	`lost_fixes` integer NOT NULL,
	`regains` text NOT NULL,
	PRIMARY KEY(`rover_id`, `day`, `shift_start`, `crew_id`)
);
--> statement-breakpoint
CREATE INDEX `shift_figures_week` ON `shift_figures` (`week`);--> statement-breakpoint
CREATE TABLE `subscriptions` (
	`user_id` integer NOT NULL,
	`sheet` text NOT NULL,
	PRIMARY KEY(`user_id`, `sheet`),
	FOREIGN KEY (`user_id`) REFERENCES `users`(`id`) ON UPDATE no action ON DELETE cascade
);
--> statement-breakpoint
CREATE TABLE `tolerance_spans` (
	`rover_id` integer NOT NULL,
	`start_at` integer NOT NULL,
	`end_at` integer NOT NULL,
	PRIMARY KEY(`rover_id`, `start_at`)
);
--> statement-breakpoint
ALTER TABLE `firm_settings` ADD `tolerance_profile` text DEFAULT '{"name":"topographic","maxAgeSeconds":10,"maxHdop":2,"minSatellites":6}' NOT NULL;--> statement-breakpoint
ALTER TABLE `firm_settings` ADD `weekly_mail_hour` integer DEFAULT 7 NOT NULL;--> statement-breakpoint
CREATE INDEX `lost_fixes_start` ON `lost_fixes` (`start_at`);