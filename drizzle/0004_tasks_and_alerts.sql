CREATE TABLE `calendar_feed` (
	`user_id` text PRIMARY KEY NOT NULL,
	`token_hash` text NOT NULL,
	`created_at` integer NOT NULL,
	FOREIGN KEY (`user_id`) REFERENCES `user`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE UNIQUE INDEX `calendar_feed_token_hash_unique` ON `calendar_feed` (`token_hash`);--> statement-breakpoint
CREATE TABLE `task_outcome` (
	`id` text PRIMARY KEY NOT NULL,
	`task_id` text NOT NULL,
	`kind` text NOT NULL,
	`due_on` text NOT NULL,
	`at` integer NOT NULL,
	`by` text NOT NULL,
	`note` text DEFAULT '' NOT NULL,
	`cause` text DEFAULT '' NOT NULL,
	`created_at` integer NOT NULL,
	FOREIGN KEY (`task_id`) REFERENCES `task`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE INDEX `task_outcome_task` ON `task_outcome` (`task_id`,`created_at`);--> statement-breakpoint
CREATE INDEX `task_outcome_cause` ON `task_outcome` (`cause`);--> statement-breakpoint
CREATE TABLE `task` (
	`id` text PRIMARY KEY NOT NULL,
	`kind` text NOT NULL,
	`title` text NOT NULL,
	`system_id` text,
	`reservoir_id` text,
	`parameter` text,
	`repeat` text,
	`starts_on` text NOT NULL,
	`due_on` text,
	`due_minute` integer,
	`assignee_id` text,
	`assignee_role` text,
	`note` text DEFAULT '' NOT NULL,
	`cause` text DEFAULT '' NOT NULL,
	`created_at` integer NOT NULL,
	`created_by` text NOT NULL,
	`ended_at` integer,
	`version` integer DEFAULT 1 NOT NULL,
	FOREIGN KEY (`system_id`) REFERENCES `system`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`reservoir_id`) REFERENCES `reservoir`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`assignee_id`) REFERENCES `user`(`id`) ON UPDATE no action ON DELETE no action,
	CONSTRAINT "task_minute" CHECK("task"."due_minute" IS NULL OR "task"."due_minute" BETWEEN 0 AND 1439),
	CONSTRAINT "task_for_one" CHECK("task"."assignee_id" IS NULL OR "task"."assignee_role" IS NULL)
);
--> statement-breakpoint
CREATE INDEX `task_due` ON `task` (`due_on`,`id`) WHERE ended_at IS NULL AND due_on IS NOT NULL;--> statement-breakpoint
CREATE INDEX `task_system` ON `task` (`system_id`,`kind`);--> statement-breakpoint
CREATE INDEX `task_reservoir` ON `task` (`reservoir_id`);--> statement-breakpoint
CREATE INDEX `task_cause` ON `task` (`cause`);--> statement-breakpoint
CREATE TABLE `alert` (
	`id` text PRIMARY KEY NOT NULL,
	`subject` text NOT NULL,
	`kind` text NOT NULL,
	`system_id` text NOT NULL,
	`reservoir_id` text,
	`urgency` text NOT NULL,
	`measure` real NOT NULL,
	`facts` text NOT NULL,
	`opened_at` integer NOT NULL,
	`last_seen_at` integer NOT NULL,
	`announcement` integer NOT NULL,
	`announced_at` integer NOT NULL,
	`acknowledged_at` integer,
	`acknowledged_by` text,
	`acknowledged_measure` real,
	`closed_at` integer,
	`closed_by` text,
	FOREIGN KEY (`system_id`) REFERENCES `system`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`reservoir_id`) REFERENCES `reservoir`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE UNIQUE INDEX `alert_open` ON `alert` (`subject`) WHERE closed_at IS NULL;--> statement-breakpoint
CREATE INDEX `alert_system` ON `alert` (`system_id`,`closed_at`);--> statement-breakpoint
CREATE INDEX `alert_closed` ON `alert` (`closed_at`,`id`);--> statement-breakpoint
CREATE INDEX `alert_opened` ON `alert` (`opened_at`,`id`);--> statement-breakpoint
CREATE INDEX `alert_announcement` ON `alert` (`announcement`);--> statement-breakpoint
CREATE TABLE `notification_choice` (
	`user_id` text PRIMARY KEY NOT NULL,
	`alerts_at_once` integer NOT NULL,
	`digest_hour` integer,
	`muted_kinds` text NOT NULL,
	`heard_up_to` integer NOT NULL,
	`last_digest_on` text,
	`version` integer DEFAULT 1 NOT NULL,
	FOREIGN KEY (`user_id`) REFERENCES `user`(`id`) ON UPDATE no action ON DELETE no action
);
