CREATE TABLE `label_fit` (
	`stock_id` text NOT NULL,
	`printer` text NOT NULL,
	`shift_x_mm` real NOT NULL,
	`shift_y_mm` real NOT NULL,
	`scale_x` real NOT NULL,
	`scale_y` real NOT NULL,
	`saved_at` integer NOT NULL,
	`by` text NOT NULL,
	PRIMARY KEY(`stock_id`, `printer`),
	CONSTRAINT "label_fit_scale" CHECK("label_fit"."scale_x" > 0 AND "label_fit"."scale_y" > 0)
);
--> statement-breakpoint
CREATE TABLE `label_print` (
	`id` text PRIMARY KEY NOT NULL,
	`subject` text NOT NULL,
	`title` text NOT NULL,
	`labels` integer NOT NULL,
	`stock_id` text NOT NULL,
	`start` integer NOT NULL,
	`printer` text NOT NULL,
	`edges` integer NOT NULL,
	`at` integer NOT NULL,
	`by` text NOT NULL,
	CONSTRAINT "label_print_labels" CHECK("label_print"."labels" > 0)
);
--> statement-breakpoint
CREATE INDEX `label_print_at` ON `label_print` (`at`,`id`);--> statement-breakpoint
CREATE TABLE `label_stock` (
	`id` text PRIMARY KEY NOT NULL,
	`name` text NOT NULL,
	`paper` text NOT NULL,
	`shape` text NOT NULL,
	`width_mm` real NOT NULL,
	`height_mm` real NOT NULL,
	`columns` integer NOT NULL,
	`rows` integer NOT NULL,
	`left_mm` real NOT NULL,
	`top_mm` real NOT NULL,
	`pitch_x_mm` real NOT NULL,
	`pitch_y_mm` real NOT NULL,
	`cut_lines` integer NOT NULL,
	`created_at` integer NOT NULL,
	`retired_at` integer,
	`version` integer DEFAULT 1 NOT NULL,
	CONSTRAINT "label_stock_size" CHECK("label_stock"."width_mm" > 0 AND "label_stock"."height_mm" > 0),
	CONSTRAINT "label_stock_grid" CHECK("label_stock"."columns" > 0 AND "label_stock"."rows" > 0)
);
--> statement-breakpoint
CREATE UNIQUE INDEX `label_stock_name` ON `label_stock` (`name`) WHERE "label_stock"."retired_at" IS NULL;