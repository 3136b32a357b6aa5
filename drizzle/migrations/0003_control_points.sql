CREATE TABLE `control_points` (
	`id` integer PRIMARY KEY AUTOINCREMENT NOT NULL,
	`name` text NOT NULL,
	`latitude` real NOT NULL,
	`longitude` real NOT NULL,
	`height` real,
	`height_kind` text NOT NULL,
	`datum` text,
	`note` text,
	`active` integer DEFAULT true NOT NULL
);
--> statement-breakpoint
CREATE UNIQUE INDEX `control_points_name_unique` ON `control_points` (`name`);