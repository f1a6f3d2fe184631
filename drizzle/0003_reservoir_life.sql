CREATE TABLE `reservoir_feed` (
	`reservoir_id` text NOT NULL,
	`system_id` text NOT NULL,
	`since` integer NOT NULL,
	`share` real NOT NULL,
	PRIMARY KEY(`reservoir_id`, `since`, `system_id`),
	FOREIGN KEY (`reservoir_id`) REFERENCES `reservoir`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`system_id`) REFERENCES `system`(`id`) ON UPDATE no action ON DELETE no action,
	CONSTRAINT "reservoir_feed_share" CHECK("reservoir_feed"."share" > 0 AND "reservoir_feed"."share" <= 1)
);
--> statement-breakpoint
CREATE INDEX `reservoir_feed_system` ON `reservoir_feed` (`system_id`);--> statement-breakpoint
ALTER TABLE `reservoir_event` ADD `conductivity_ms_cm` real;--> statement-breakpoint
ALTER TABLE `reservoir_event` ADD `fresh_ms_cm` real;--> statement-breakpoint
ALTER TABLE `reservoir_event` ADD `strength_left` real;--> statement-breakpoint
ALTER TABLE `reservoir_event` ADD `intake_mm` real;--> statement-breakpoint
ALTER TABLE `reservoir_event` ADD `covered` integer;--> statement-breakpoint
ALTER TABLE `reservoir` ADD `height_mm` real;--> statement-breakpoint
ALTER TABLE `reservoir` ADD `footprint_cm2` real;--> statement-breakpoint
ALTER TABLE `reservoir` ADD `intake_mm` real;--> statement-breakpoint
ALTER TABLE `reservoir` ADD `covered` integer DEFAULT true NOT NULL;--> statement-breakpoint
ALTER TABLE `reservoir` ADD `replace_days` integer;--> statement-breakpoint
ALTER TABLE `reservoir` ADD `sludge_weeks` integer DEFAULT 6 NOT NULL;--> statement-breakpoint
ALTER TABLE `reservoir` ADD `pump_l_per_h` real;--> statement-breakpoint
ALTER TABLE `system` ADD `surface_m2` real;