CREATE TABLE `calibration` (
	`id` text PRIMARY KEY NOT NULL,
	`method_id` text NOT NULL,
	`kit_lot_id` text,
	`at` integer NOT NULL,
	`solution` text DEFAULT '' NOT NULL,
	`reference_value` real NOT NULL,
	`reference_sd` real NOT NULL,
	`found` text NOT NULL,
	`bias` real NOT NULL,
	`bias_sd` real NOT NULL,
	`by` text NOT NULL,
	`note` text DEFAULT '' NOT NULL,
	`created_at` integer NOT NULL,
	FOREIGN KEY (`method_id`) REFERENCES `test_method`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`kit_lot_id`) REFERENCES `kit_lot`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE INDEX `calibration_method` ON `calibration` (`method_id`,`at`);--> statement-breakpoint
CREATE INDEX `calibration_kit_lot` ON `calibration` (`kit_lot_id`);--> statement-breakpoint
CREATE TABLE `kit_lot` (
	`id` text PRIMARY KEY NOT NULL,
	`method_id` text NOT NULL,
	`code` text NOT NULL,
	`opened_on` text,
	`expires_on` text,
	`created_at` integer NOT NULL,
	`used_up_at` integer,
	`version` integer DEFAULT 1 NOT NULL,
	FOREIGN KEY (`method_id`) REFERENCES `test_method`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE UNIQUE INDEX `kit_lot_once` ON `kit_lot` (`method_id`,`code`);--> statement-breakpoint
CREATE TABLE `reading_photo` (
	`id` text PRIMARY KEY NOT NULL,
	`content_type` text NOT NULL,
	`content` blob NOT NULL,
	`at` integer NOT NULL,
	`by` text NOT NULL,
	`by_user_id` text
);
--> statement-breakpoint
CREATE INDEX `reading_photo_at` ON `reading_photo` (`at`);--> statement-breakpoint
CREATE TABLE `test_method` (
	`id` text PRIMARY KEY NOT NULL,
	`parameter` text NOT NULL,
	`name` text NOT NULL,
	`unit` text NOT NULL,
	`repeatability_sd` real NOT NULL,
	`resolution` real NOT NULL,
	`source` text DEFAULT '' NOT NULL,
	`created_at` integer NOT NULL,
	`retired_at` integer,
	`version` integer DEFAULT 1 NOT NULL,
	CONSTRAINT "test_method_sd" CHECK("test_method"."repeatability_sd" > 0 AND "test_method"."resolution" > 0)
);
--> statement-breakpoint
CREATE UNIQUE INDEX `test_method_once` ON `test_method` (`parameter`,`name`);--> statement-breakpoint
CREATE TABLE `reading_import_file` (
	`import_id` text PRIMARY KEY NOT NULL,
	`content` blob NOT NULL,
	`mapping` text NOT NULL,
	FOREIGN KEY (`import_id`) REFERENCES `reading_import`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
ALTER TABLE `reading_import` ADD `state` text DEFAULT 'finished' NOT NULL;--> statement-breakpoint
ALTER TABLE `reading_import` ADD `rows` integer DEFAULT 0 NOT NULL;--> statement-breakpoint
ALTER TABLE `reading_import` ADD `rows_done` integer DEFAULT 0 NOT NULL;--> statement-breakpoint
ALTER TABLE `reading_import` ADD `duplicates` integer DEFAULT 0 NOT NULL;--> statement-breakpoint
ALTER TABLE `reading_import` ADD `bad_rows` integer DEFAULT 0 NOT NULL;--> statement-breakpoint
ALTER TABLE `reading_import` ADD `failure` text;--> statement-breakpoint
CREATE INDEX `reading_import_at` ON `reading_import` (`at`);--> statement-breakpoint
CREATE INDEX `reading_import_state` ON `reading_import` (`state`);--> statement-breakpoint
ALTER TABLE `reading` ADD `method_id` text REFERENCES test_method(id);--> statement-breakpoint
ALTER TABLE `reading` ADD `kit_lot_id` text REFERENCES kit_lot(id);--> statement-breakpoint
ALTER TABLE `reading` ADD `calibration_id` text REFERENCES calibration(id);--> statement-breakpoint
ALTER TABLE `reading` ADD `measured` real;--> statement-breakpoint
ALTER TABLE `reading` ADD `sd` real;--> statement-breakpoint
ALTER TABLE `reading` ADD `repeats` text;--> statement-breakpoint
ALTER TABLE `reading` ADD `unit` text;--> statement-breakpoint
ALTER TABLE `reading` ADD `photo_id` text REFERENCES reading_photo(id);--> statement-breakpoint
CREATE INDEX `reading_method_time` ON `reading` (`method_id`,`taken_at`);--> statement-breakpoint
CREATE INDEX `reading_by_time` ON `reading` (`by`,`taken_at`);--> statement-breakpoint
CREATE INDEX `reading_calibration` ON `reading` (`calibration_id`);--> statement-breakpoint
CREATE INDEX `reading_photo_id` ON `reading` (`photo_id`);