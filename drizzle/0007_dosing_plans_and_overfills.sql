CREATE TABLE `dosing_advice` (
	`id` text PRIMARY KEY NOT NULL,
	`system_id` text NOT NULL,
	`kind` text NOT NULL,
	`rules` text NOT NULL,
	`text` text NOT NULL,
	`inputs` text NOT NULL,
	`advice` text NOT NULL,
	`outcome` text NOT NULL,
	`reason` text DEFAULT '' NOT NULL,
	`at` integer NOT NULL,
	`by` text NOT NULL,
	`taken_back_at` integer,
	FOREIGN KEY (`system_id`) REFERENCES `system`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE INDEX `dosing_advice_system` ON `dosing_advice` (`system_id`,`at`);--> statement-breakpoint
CREATE TABLE `dosing_plan` (
	`id` text PRIMARY KEY NOT NULL,
	`system_id` text NOT NULL,
	`advice_id` text NOT NULL,
	`from_at` integer NOT NULL,
	`to_at` integer,
	`strength_meq_l` real NOT NULL,
	`lime_g_per_l` real NOT NULL,
	`vinegar_ml_per_l` real NOT NULL,
	`litres_per_day` real NOT NULL,
	`supplements` text NOT NULL,
	`by` text NOT NULL,
	FOREIGN KEY (`system_id`) REFERENCES `system`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`advice_id`) REFERENCES `dosing_advice`(`id`) ON UPDATE no action ON DELETE no action,
	CONSTRAINT "dosing_plan_amounts" CHECK("dosing_plan"."strength_meq_l" >= 0 AND "dosing_plan"."lime_g_per_l" >= 0 AND "dosing_plan"."vinegar_ml_per_l" >= 0 AND "dosing_plan"."litres_per_day" >= 0),
	CONSTRAINT "dosing_plan_span" CHECK("dosing_plan"."to_at" IS NULL OR "dosing_plan"."to_at" >= "dosing_plan"."from_at")
);
--> statement-breakpoint
CREATE INDEX `dosing_plan_system` ON `dosing_plan` (`system_id`,`from_at`);--> statement-breakpoint
CREATE INDEX `dosing_plan_advice` ON `dosing_plan` (`advice_id`);--> statement-breakpoint
CREATE UNIQUE INDEX `dosing_plan_running` ON `dosing_plan` (`system_id`) WHERE "dosing_plan"."to_at" IS NULL;--> statement-breakpoint
CREATE TABLE `overfill` (
	`id` text PRIMARY KEY NOT NULL,
	`system_id` text NOT NULL,
	`reservoir_id` text NOT NULL,
	`before_event_id` text,
	`event_id` text NOT NULL,
	`litres` real NOT NULL,
	`alkalinity_meq_l` real NOT NULL,
	`at` integer NOT NULL,
	`by` text NOT NULL,
	`note` text DEFAULT '' NOT NULL,
	FOREIGN KEY (`system_id`) REFERENCES `system`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`reservoir_id`) REFERENCES `reservoir`(`id`) ON UPDATE no action ON DELETE no action,
	CONSTRAINT "overfill_litres" CHECK("overfill"."litres" > 0 AND "overfill"."alkalinity_meq_l" >= 0)
);
--> statement-breakpoint
CREATE INDEX `overfill_system` ON `overfill` (`system_id`,`at`);--> statement-breakpoint
CREATE INDEX `overfill_reservoir` ON `overfill` (`reservoir_id`);