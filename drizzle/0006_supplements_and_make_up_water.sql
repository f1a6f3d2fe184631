CREATE TABLE `salt_batch` (
	`id` text PRIMARY KEY NOT NULL,
	`litres` real NOT NULL,
	`remaining_l` real NOT NULL,
	`salt_item_id` text,
	`salt_g` real DEFAULT 0 NOT NULL,
	`salinity` real,
	`alkalinity_meq_l` real,
	`calcium_mg_l` real,
	`magnesium_mg_l` real,
	`temperature_c` real,
	`at` integer NOT NULL,
	`ready_at` integer NOT NULL,
	`by` text NOT NULL,
	`note` text DEFAULT '' NOT NULL,
	`discarded_at` integer,
	`version` integer DEFAULT 1 NOT NULL,
	CONSTRAINT "salt_batch_remaining" CHECK("salt_batch"."litres" > 0 AND "salt_batch"."remaining_l" >= 0 AND "salt_batch"."remaining_l" <= "salt_batch"."litres")
);
--> statement-breakpoint
CREATE INDEX `salt_batch_at` ON `salt_batch` (`at`);--> statement-breakpoint
CREATE TABLE `dosing_booking` (
	`id` text PRIMARY KEY NOT NULL,
	`rate_id` text NOT NULL,
	`day` text NOT NULL,
	`amount` real NOT NULL,
	`booked` real NOT NULL,
	FOREIGN KEY (`rate_id`) REFERENCES `dosing_rate`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE UNIQUE INDEX `dosing_booking_once` ON `dosing_booking` (`rate_id`,`day`);--> statement-breakpoint
CREATE TABLE `dosing_pump` (
	`id` text PRIMARY KEY NOT NULL,
	`code` text NOT NULL,
	`name` text NOT NULL,
	`created_at` integer NOT NULL,
	`retired_at` integer,
	`version` integer DEFAULT 1 NOT NULL
);
--> statement-breakpoint
CREATE UNIQUE INDEX `dosing_pump_code_unique` ON `dosing_pump` (`code`);--> statement-breakpoint
CREATE TABLE `dosing_rate` (
	`id` text PRIMARY KEY NOT NULL,
	`system_id` text NOT NULL,
	`item_id` text NOT NULL,
	`pump_id` text,
	`amount_per_day` real NOT NULL,
	`start_minute` integer,
	`end_minute` integer,
	`from_at` integer NOT NULL,
	`to_at` integer,
	`by` text NOT NULL,
	`ended_by` text,
	`note` text DEFAULT '' NOT NULL,
	FOREIGN KEY (`system_id`) REFERENCES `system`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`item_id`) REFERENCES `item`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`pump_id`) REFERENCES `dosing_pump`(`id`) ON UPDATE no action ON DELETE no action,
	CONSTRAINT "dosing_rate_span" CHECK("dosing_rate"."amount_per_day" > 0 AND ("dosing_rate"."to_at" IS NULL OR "dosing_rate"."to_at" >= "dosing_rate"."from_at"))
);
--> statement-breakpoint
CREATE INDEX `dosing_rate_system` ON `dosing_rate` (`system_id`,`from_at`);--> statement-breakpoint
CREATE INDEX `dosing_rate_item` ON `dosing_rate` (`item_id`);--> statement-breakpoint
CREATE UNIQUE INDEX `dosing_rate_running` ON `dosing_rate` (`system_id`,`item_id`) WHERE "dosing_rate"."to_at" IS NULL;--> statement-breakpoint
CREATE TABLE `pump_calibration` (
	`id` text PRIMARY KEY NOT NULL,
	`pump_id` text NOT NULL,
	`asked_ml` real NOT NULL,
	`measured_ml` text NOT NULL,
	`factor` real NOT NULL,
	`adjusted` integer NOT NULL,
	`at` integer NOT NULL,
	`by` text NOT NULL,
	`note` text DEFAULT '' NOT NULL,
	FOREIGN KEY (`pump_id`) REFERENCES `dosing_pump`(`id`) ON UPDATE no action ON DELETE no action,
	CONSTRAINT "pump_calibration_factor" CHECK("pump_calibration"."asked_ml" > 0 AND "pump_calibration"."factor" > 0)
);
--> statement-breakpoint
CREATE INDEX `pump_calibration_of` ON `pump_calibration` (`pump_id`,`at`);--> statement-breakpoint
CREATE TABLE `solution_batch` (
	`id` text PRIMARY KEY NOT NULL,
	`solution_id` text NOT NULL,
	`lot_id` text NOT NULL,
	`litres` real NOT NULL,
	`at` integer NOT NULL,
	`by` text NOT NULL,
	FOREIGN KEY (`solution_id`) REFERENCES `stock_solution`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`lot_id`) REFERENCES `lot`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE INDEX `solution_batch_of` ON `solution_batch` (`solution_id`,`at`);--> statement-breakpoint
CREATE TABLE `stock_solution_part` (
	`solution_id` text NOT NULL,
	`position` integer NOT NULL,
	`item_id` text NOT NULL,
	`powder` text NOT NULL,
	`purity` real NOT NULL,
	`grams` real NOT NULL,
	PRIMARY KEY(`solution_id`, `position`),
	FOREIGN KEY (`solution_id`) REFERENCES `stock_solution`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`item_id`) REFERENCES `item`(`id`) ON UPDATE no action ON DELETE no action,
	CONSTRAINT "stock_solution_part_amount" CHECK("stock_solution_part"."grams" > 0 AND "stock_solution_part"."purity" > 0 AND "stock_solution_part"."purity" <= 1)
);
--> statement-breakpoint
CREATE TABLE `stock_solution` (
	`id` text PRIMARY KEY NOT NULL,
	`item_id` text NOT NULL,
	`litres` real NOT NULL,
	`note` text DEFAULT '' NOT NULL,
	`created_at` integer NOT NULL,
	FOREIGN KEY (`item_id`) REFERENCES `item`(`id`) ON UPDATE no action ON DELETE no action,
	CONSTRAINT "stock_solution_litres" CHECK("stock_solution"."litres" > 0)
);
--> statement-breakpoint
CREATE UNIQUE INDEX `stock_solution_item_id_unique` ON `stock_solution` (`item_id`);--> statement-breakpoint
CREATE TABLE `cartridge` (
	`id` text PRIMARY KEY NOT NULL,
	`stage` text NOT NULL,
	`name` text NOT NULL,
	`item_id` text,
	`installed_on` text NOT NULL,
	`life_days` integer,
	`life_l` real,
	`limit_value` real,
	`removed_on` text,
	`by` text NOT NULL,
	`note` text DEFAULT '' NOT NULL,
	`version` integer DEFAULT 1 NOT NULL,
	FOREIGN KEY (`item_id`) REFERENCES `item`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE INDEX `cartridge_installed` ON `cartridge` (`installed_on`);--> statement-breakpoint
CREATE TABLE `make_up_reading` (
	`id` text PRIMARY KEY NOT NULL,
	`at` integer NOT NULL,
	`tds_in` real,
	`tds_membrane` real,
	`tds_out` real,
	`litres_made` real,
	`by` text NOT NULL,
	`note` text DEFAULT '' NOT NULL
);
--> statement-breakpoint
CREATE INDEX `make_up_reading_at` ON `make_up_reading` (`at`);--> statement-breakpoint
CREATE TABLE `water_change_plan` (
	`system_id` text PRIMARY KEY NOT NULL,
	`every_days` integer NOT NULL,
	`fraction` real NOT NULL,
	`start_on` text NOT NULL,
	`by` text NOT NULL,
	`updated_at` integer NOT NULL,
	`version` integer DEFAULT 1 NOT NULL,
	FOREIGN KEY (`system_id`) REFERENCES `system`(`id`) ON UPDATE no action ON DELETE no action,
	CONSTRAINT "water_change_plan_habit" CHECK("water_change_plan"."every_days" >= 1 AND "water_change_plan"."fraction" > 0 AND "water_change_plan"."fraction" <= 1)
);
--> statement-breakpoint
ALTER TABLE `dose` ADD `calcium_mg` real DEFAULT 0 NOT NULL;--> statement-breakpoint
ALTER TABLE `dose` ADD `magnesium_mg` real DEFAULT 0 NOT NULL;--> statement-breakpoint
ALTER TABLE `water_change` ADD `calcium_mg_l` real;--> statement-breakpoint
ALTER TABLE `water_change` ADD `magnesium_mg_l` real;--> statement-breakpoint
ALTER TABLE `water_change` ADD `salinity` real;--> statement-breakpoint
ALTER TABLE `water_change` ADD `salt_batch_id` text REFERENCES salt_batch(id);--> statement-breakpoint
ALTER TABLE `item` ADD `calcium_mg` real;--> statement-breakpoint
ALTER TABLE `item` ADD `magnesium_mg` real;