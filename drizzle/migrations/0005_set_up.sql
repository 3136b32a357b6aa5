CREATE TABLE `check_shots` (
	`id` integer PRIMARY KEY AUTOINCREMENT NOT NULL,
	`rover_id` integer NOT NULL,
	`crew_id` integer,
	`control_point_id` integer NOT NULL,
	`control_point_name` text NOT NULL,
	`datum` text,
	`set_up_card_id` integer,
	`at` integer NOT NULL,
	`by` text NOT NULL,
	`station_id` integer,
	`mount_point` text,
	`passed` integer NOT NULL,
	`result` text NOT NULL,
	`note` text,
	FOREIGN KEY (`rover_id`) REFERENCES `rovers`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`crew_id`) REFERENCES `crews`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`control_point_id`) REFERENCES `control_points`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`set_up_card_id`) REFERENCES `set_up_cards`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE INDEX `check_shots_rover` ON `check_shots` (`rover_id`,`at`);--> statement-breakpoint
CREATE INDEX `check_shots_at` ON `check_shots` (`at`);--> statement-breakpoint
CREATE TABLE `correction_checks` (
	`id` integer PRIMARY KEY AUTOINCREMENT NOT NULL,
	`source_id` integer NOT NULL,
	`started_at` integer NOT NULL,
	`ended_at` integer,
	`status` text NOT NULL,
	`by` text,
	`place` text,
	`passed` integer,
	`failed_step` text,
	`report` text NOT NULL,
	FOREIGN KEY (`source_id`) REFERENCES `correction_sources`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE INDEX `correction_checks_source` ON `correction_checks` (`source_id`,`started_at`);--> statement-breakpoint
CREATE TABLE `logs` (
	`id` integer PRIMARY KEY AUTOINCREMENT NOT NULL,
	`name` text NOT NULL,
	`bytes` integer NOT NULL,
	`at` integer NOT NULL,
	`by` text NOT NULL,
	`date` text,
	`rover_id` integer,
	`file` text,
	`status` text NOT NULL,
	`problem` text,
	`summary` text,
	`detail` text,
	FOREIGN KEY (`rover_id`) REFERENCES `rovers`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE INDEX `logs_at` ON `logs` (`at`);--> statement-breakpoint
CREATE TABLE `set_up_cards` (
	`id` integer PRIMARY KEY AUTOINCREMENT NOT NULL,
	`rover_id` integer NOT NULL,
	`crew_id` integer,
	`at` integer NOT NULL,
	`by` text NOT NULL,
	`pole_height_m` real NOT NULL,
	`measuring_point` text NOT NULL,
	`antenna_offset_m` real NOT NULL,
	`tilt` text NOT NULL,
	`correction_source_id` integer,
	`message_format` text NOT NULL,
	`tolerance_profile` text,
	`checked_by` text NOT NULL,
	`note` text,
	`confirmed` text NOT NULL,
	FOREIGN KEY (`rover_id`) REFERENCES `rovers`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`crew_id`) REFERENCES `crews`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`correction_source_id`) REFERENCES `correction_sources`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE INDEX `set_up_cards_rover` ON `set_up_cards` (`rover_id`,`at`);--> statement-breakpoint
ALTER TABLE `correction_sources` ADD `user` text;--> statement-breakpoint
ALTER TABLE `correction_sources` ADD `sealed_password` text;--> statement-breakpoint
ALTER TABLE `correction_sources` ADD `ntrip_version` integer DEFAULT 2 NOT NULL;--> statement-breakpoint
ALTER TABLE `correction_sources` ADD `tls` integer DEFAULT false NOT NULL;--> statement-breakpoint
ALTER TABLE `correction_sources` ADD `send_position` integer DEFAULT false NOT NULL;--> statement-breakpoint
ALTER TABLE `correction_sources` ADD `expected_format` text DEFAULT 'any' NOT NULL;--> statement-breakpoint
ALTER TABLE `correction_sources` ADD `watch_minutes` integer;--> statement-breakpoint
ALTER TABLE `correction_sources` ADD `decoded_at` integer;--> statement-breakpoint
ALTER TABLE `correction_sources` ADD `decoded_station_id` integer;--> statement-breakpoint
ALTER TABLE `correction_sources` ADD `decoded_latitude` real;--> statement-breakpoint
ALTER TABLE `correction_sources` ADD `decoded_longitude` real;--> statement-breakpoint
ALTER TABLE `correction_sources` ADD `decoded_height_m` real;--> statement-breakpoint
ALTER TABLE `correction_sources` ADD `down_since` integer;--> statement-breakpoint
ALTER TABLE `correction_sources` ADD `refused_at` integer;--> statement-breakpoint
ALTER TABLE `firm_settings` ADD `check_shot_limits` text DEFAULT '{"horizontalM":0.03,"verticalM":0.05,"againAfterLostMinutes":10}' NOT NULL;