ALTER TABLE `crews` ADD `tolerance_profile` text;--> statement-breakpoint
ALTER TABLE `firm_settings` ADD `other_profiles` text DEFAULT '[]' NOT NULL;