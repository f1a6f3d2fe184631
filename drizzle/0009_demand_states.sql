CREATE TABLE `demand_state` (
	`system_id` text NOT NULL,
	`parameter` text NOT NULL,
	`at` integer NOT NULL,
	`demand` real NOT NULL,
	`variance` real NOT NULL,
	`drift_variance` real NOT NULL,
	`tested_at` text NOT NULL,
	PRIMARY KEY(`system_id`, `parameter`),
	FOREIGN KEY (`system_id`) REFERENCES `system`(`id`) ON UPDATE no action ON DELETE cascade
);
