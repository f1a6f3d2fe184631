CREATE TABLE `audit_log` (
	`id` integer PRIMARY KEY AUTOINCREMENT NOT NULL,
	`at` integer NOT NULL,
	`actor_id` text,
	`actor_name` text NOT NULL,
	`action` text NOT NULL,
	`entity` text NOT NULL,
	`entity_id` text NOT NULL,
	`before` text,
	`after` text
);
--> statement-breakpoint
CREATE INDEX `audit_log_entity` ON `audit_log` (`entity`,`entity_id`);--> statement-breakpoint
CREATE INDEX `audit_log_at` ON `audit_log` (`at`);--> statement-breakpoint
CREATE TABLE `farm` (
	`id` integer PRIMARY KEY NOT NULL,
	`name` text NOT NULL,
	`time_zone` text NOT NULL,
	`currency` text NOT NULL,
	`address` text DEFAULT '' NOT NULL,
	`email` text DEFAULT '' NOT NULL,
	`phone` text DEFAULT '' NOT NULL,
	`tax_percent_hundredths` integer DEFAULT 0 NOT NULL,
	`settings` text DEFAULT '{}' NOT NULL,
	`demo` integer DEFAULT false NOT NULL,
	`created_at` integer NOT NULL,
	`version` integer DEFAULT 1 NOT NULL,
	CONSTRAINT "farm_is_one" CHECK("farm"."id" = 1)
);
--> statement-breakpoint
CREATE TABLE `idempotency_key` (
	`key` text NOT NULL,
	`caller_id` text NOT NULL,
	`route` text NOT NULL,
	`request_hash` text NOT NULL,
	`status` integer NOT NULL,
	`answer` text,
	`at` integer NOT NULL,
	PRIMARY KEY(`caller_id`, `key`)
);
--> statement-breakpoint
CREATE INDEX `idempotency_key_at` ON `idempotency_key` (`at`);--> statement-breakpoint
CREATE TABLE `outbox_mail` (
	`id` text PRIMARY KEY NOT NULL,
	`template` text NOT NULL,
	`to_address` text NOT NULL,
	`data` text NOT NULL,
	`created_at` integer NOT NULL,
	`sent_at` integer,
	`attempts` integer DEFAULT 0 NOT NULL,
	`next_attempt_at` integer NOT NULL,
	`last_error` text
);
--> statement-breakpoint
CREATE INDEX `outbox_mail_due` ON `outbox_mail` (`sent_at`,`next_attempt_at`);--> statement-breakpoint
CREATE TABLE `mailed_token` (
	`id` text PRIMARY KEY NOT NULL,
	`kind` text NOT NULL,
	`token_hash` text NOT NULL,
	`email` text NOT NULL,
	`user_id` text,
	`role` text,
	`store_id` text,
	`created_at` integer NOT NULL,
	`created_by` text,
	`expires_at` integer NOT NULL,
	`used_at` integer,
	FOREIGN KEY (`user_id`) REFERENCES `user`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`store_id`) REFERENCES `store`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE UNIQUE INDEX `mailed_token_token_hash_unique` ON `mailed_token` (`token_hash`);--> statement-breakpoint
CREATE INDEX `mailed_token_email` ON `mailed_token` (`email`);--> statement-breakpoint
CREATE TABLE `session` (
	`sid` text PRIMARY KEY NOT NULL,
	`user_id` text,
	`data` text NOT NULL,
	`created_at` integer NOT NULL,
	`expires_at` integer NOT NULL,
	FOREIGN KEY (`user_id`) REFERENCES `user`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE INDEX `session_user` ON `session` (`user_id`);--> statement-breakpoint
CREATE INDEX `session_expires` ON `session` (`expires_at`);--> statement-breakpoint
CREATE TABLE `sign_in_failure` (
	`id` integer PRIMARY KEY AUTOINCREMENT NOT NULL,
	`subject` text NOT NULL,
	`at` integer NOT NULL
);
--> statement-breakpoint
CREATE INDEX `sign_in_failure_subject` ON `sign_in_failure` (`subject`,`at`);--> statement-breakpoint
CREATE TABLE `user` (
	`id` text PRIMARY KEY NOT NULL,
	`email` text NOT NULL,
	`name` text NOT NULL,
	`role` text NOT NULL,
	`store_id` text,
	`password_hash` text NOT NULL,
	`demo` integer DEFAULT false NOT NULL,
	`created_at` integer NOT NULL,
	`disabled_at` integer,
	`version` integer DEFAULT 1 NOT NULL,
	FOREIGN KEY (`store_id`) REFERENCES `store`(`id`) ON UPDATE no action ON DELETE no action,
	CONSTRAINT "user_buyer_has_store" CHECK(("user"."role" = 'buyer') = ("user"."store_id" IS NOT NULL))
);
--> statement-breakpoint
CREATE UNIQUE INDEX `user_email_unique` ON `user` (`email`);--> statement-breakpoint
CREATE TABLE `dose` (
	`id` text PRIMARY KEY NOT NULL,
	`system_id` text NOT NULL,
	`item_id` text NOT NULL,
	`amount` real NOT NULL,
	`alkalinity_meq` real NOT NULL,
	`at` integer NOT NULL,
	`by` text NOT NULL,
	`note` text DEFAULT '' NOT NULL,
	FOREIGN KEY (`system_id`) REFERENCES `system`(`id`) ON UPDATE no action ON DELETE no action,
	CONSTRAINT "dose_amount" CHECK("dose"."amount" > 0)
);
--> statement-breakpoint
CREATE INDEX `dose_system` ON `dose` (`system_id`,`at`);--> statement-breakpoint
CREATE TABLE `rack` (
	`id` text PRIMARY KEY NOT NULL,
	`tank_id` text NOT NULL,
	`code` text NOT NULL,
	`rows` integer NOT NULL,
	`columns` integer NOT NULL,
	`created_at` integer NOT NULL,
	`retired_at` integer,
	`version` integer DEFAULT 1 NOT NULL,
	FOREIGN KEY (`tank_id`) REFERENCES `tank`(`id`) ON UPDATE no action ON DELETE no action,
	CONSTRAINT "rack_size" CHECK("rack"."rows" BETWEEN 1 AND 26 AND "rack"."columns" BETWEEN 1 AND 99)
);
--> statement-breakpoint
CREATE UNIQUE INDEX `rack_code_unique` ON `rack` (`code`);--> statement-breakpoint
CREATE INDEX `rack_tank` ON `rack` (`tank_id`);--> statement-breakpoint
CREATE TABLE `reading_import` (
	`id` text PRIMARY KEY NOT NULL,
	`file_name` text NOT NULL,
	`readings` integer NOT NULL,
	`at` integer NOT NULL,
	`by` text NOT NULL
);
--> statement-breakpoint
CREATE TABLE `reading` (
	`id` text PRIMARY KEY NOT NULL,
	`system_id` text NOT NULL,
	`parameter` text NOT NULL,
	`value` real NOT NULL,
	`method` text DEFAULT '' NOT NULL,
	`taken_at` integer NOT NULL,
	`by` text NOT NULL,
	`note` text DEFAULT '' NOT NULL,
	`import_id` text,
	`created_at` integer NOT NULL,
	`version` integer DEFAULT 1 NOT NULL,
	FOREIGN KEY (`system_id`) REFERENCES `system`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`import_id`) REFERENCES `reading_import`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE INDEX `reading_system_time` ON `reading` (`system_id`,`taken_at`);--> statement-breakpoint
CREATE INDEX `reading_parameter_time` ON `reading` (`parameter`,`taken_at`);--> statement-breakpoint
CREATE INDEX `reading_time` ON `reading` (`taken_at`);--> statement-breakpoint
CREATE INDEX `reading_import_id` ON `reading` (`import_id`);--> statement-breakpoint
CREATE UNIQUE INDEX `reading_once` ON `reading` (`system_id`,`parameter`,`taken_at`);--> statement-breakpoint
CREATE TABLE `reservoir_event` (
	`id` text PRIMARY KEY NOT NULL,
	`reservoir_id` text NOT NULL,
	`kind` text NOT NULL,
	`at` integer NOT NULL,
	`by` text NOT NULL,
	`level_before_l` real NOT NULL,
	`level_l` real NOT NULL,
	`alkalinity_meq_l` real NOT NULL,
	`water_l` real,
	`lime_g` real,
	`lime_purity` real,
	`vinegar_ml` real,
	`acid_percent` real,
	`temperature_c` real,
	`undissolved_g` real,
	`calcium_mg_l` real,
	`note` text DEFAULT '' NOT NULL,
	FOREIGN KEY (`reservoir_id`) REFERENCES `reservoir`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE INDEX `reservoir_event_order` ON `reservoir_event` (`reservoir_id`,`at`);--> statement-breakpoint
CREATE TABLE `reservoir` (
	`id` text PRIMARY KEY NOT NULL,
	`code` text NOT NULL,
	`system_id` text NOT NULL,
	`volume_l` real NOT NULL,
	`state` text DEFAULT 'standby' NOT NULL,
	`level_l` real DEFAULT 0 NOT NULL,
	`alkalinity_meq_l` real DEFAULT 0 NOT NULL,
	`ready_at` integer,
	`created_at` integer NOT NULL,
	`retired_at` integer,
	`version` integer DEFAULT 1 NOT NULL,
	FOREIGN KEY (`system_id`) REFERENCES `system`(`id`) ON UPDATE no action ON DELETE no action,
	CONSTRAINT "reservoir_level" CHECK("reservoir"."level_l" >= 0 AND "reservoir"."level_l" <= "reservoir"."volume_l" * 1.02)
);
--> statement-breakpoint
CREATE UNIQUE INDEX `reservoir_code_unique` ON `reservoir` (`code`);--> statement-breakpoint
CREATE INDEX `reservoir_system` ON `reservoir` (`system_id`);--> statement-breakpoint
CREATE TABLE `system` (
	`id` text PRIMARY KEY NOT NULL,
	`code` text NOT NULL,
	`name` text NOT NULL,
	`kind` text NOT NULL,
	`net_volume_l` real NOT NULL,
	`note` text DEFAULT '' NOT NULL,
	`created_at` integer NOT NULL,
	`retired_at` integer,
	`version` integer DEFAULT 1 NOT NULL,
	CONSTRAINT "system_volume_positive" CHECK("system"."net_volume_l" > 0)
);
--> statement-breakpoint
CREATE UNIQUE INDEX `system_code_unique` ON `system` (`code`);--> statement-breakpoint
CREATE TABLE `tank` (
	`id` text PRIMARY KEY NOT NULL,
	`system_id` text NOT NULL,
	`code` text NOT NULL,
	`name` text NOT NULL,
	`created_at` integer NOT NULL,
	FOREIGN KEY (`system_id`) REFERENCES `system`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE UNIQUE INDEX `tank_code_unique` ON `tank` (`code`);--> statement-breakpoint
CREATE INDEX `tank_system` ON `tank` (`system_id`);--> statement-breakpoint
CREATE TABLE `target_band` (
	`system_id` text NOT NULL,
	`parameter` text NOT NULL,
	`low` real NOT NULL,
	`high` real NOT NULL,
	PRIMARY KEY(`system_id`, `parameter`),
	FOREIGN KEY (`system_id`) REFERENCES `system`(`id`) ON UPDATE no action ON DELETE no action,
	CONSTRAINT "target_band_order" CHECK("target_band"."low" < "target_band"."high")
);
--> statement-breakpoint
CREATE TABLE `water_change` (
	`id` text PRIMARY KEY NOT NULL,
	`system_id` text NOT NULL,
	`litres` real NOT NULL,
	`alkalinity_meq_l` real NOT NULL,
	`salt_g` real DEFAULT 0 NOT NULL,
	`at` integer NOT NULL,
	`by` text NOT NULL,
	FOREIGN KEY (`system_id`) REFERENCES `system`(`id`) ON UPDATE no action ON DELETE no action,
	CONSTRAINT "water_change_litres" CHECK("water_change"."litres" > 0)
);
--> statement-breakpoint
CREATE INDEX `water_change_system` ON `water_change` (`system_id`,`at`);--> statement-breakpoint
CREATE TABLE `batch` (
	`id` text PRIMARY KEY NOT NULL,
	`code` text NOT NULL,
	`line_id` text NOT NULL,
	`cut_id` text NOT NULL,
	`cut_on` text NOT NULL,
	`pieces` integer NOT NULL,
	`start_mm` real NOT NULL,
	`created_at` integer NOT NULL,
	FOREIGN KEY (`line_id`) REFERENCES `line`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`cut_id`) REFERENCES `cut`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE UNIQUE INDEX `batch_code_unique` ON `batch` (`code`);--> statement-breakpoint
CREATE INDEX `batch_line` ON `batch` (`line_id`);--> statement-breakpoint
CREATE INDEX `batch_cut` ON `batch` (`cut_id`);--> statement-breakpoint
CREATE INDEX `batch_cut_on` ON `batch` (`cut_on`);--> statement-breakpoint
CREATE TABLE `colony` (
	`id` text PRIMARY KEY NOT NULL,
	`code` text NOT NULL,
	`line_id` text NOT NULL,
	`rack_id` text NOT NULL,
	`size_mm` real NOT NULL,
	`health` text DEFAULT 'good' NOT NULL,
	`rest_days` integer NOT NULL,
	`last_cut_on` text,
	`acquired_on` text NOT NULL,
	`acquired_from` text DEFAULT '' NOT NULL,
	`created_at` integer NOT NULL,
	`retired_at` integer,
	`version` integer DEFAULT 1 NOT NULL,
	FOREIGN KEY (`line_id`) REFERENCES `line`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`rack_id`) REFERENCES `rack`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE UNIQUE INDEX `colony_code_unique` ON `colony` (`code`);--> statement-breakpoint
CREATE INDEX `colony_line` ON `colony` (`line_id`);--> statement-breakpoint
CREATE TABLE `cut` (
	`id` text PRIMARY KEY NOT NULL,
	`colony_id` text NOT NULL,
	`cut_on` text NOT NULL,
	`pieces` integer NOT NULL,
	`failed_pieces` integer DEFAULT 0 NOT NULL,
	`minutes` integer,
	`tool` text DEFAULT '' NOT NULL,
	`by` text NOT NULL,
	`note` text DEFAULT '' NOT NULL,
	`created_at` integer NOT NULL,
	`undone_at` integer,
	FOREIGN KEY (`colony_id`) REFERENCES `colony`(`id`) ON UPDATE no action ON DELETE no action,
	CONSTRAINT "cut_pieces" CHECK("cut"."pieces" > 0)
);
--> statement-breakpoint
CREATE INDEX `cut_colony` ON `cut` (`colony_id`,`cut_on`);--> statement-breakpoint
CREATE TABLE `ledger_gate` (
	`id` integer PRIMARY KEY NOT NULL,
	`open` integer NOT NULL,
	`posted_id` integer DEFAULT 0 NOT NULL
);
--> statement-breakpoint
CREATE TABLE `line` (
	`id` text PRIMARY KEY NOT NULL,
	`code` text NOT NULL,
	`trade_name` text NOT NULL,
	`taxon` text NOT NULL,
	`growth_form` text NOT NULL,
	`public_text` text DEFAULT '' NOT NULL,
	`care_text` text DEFAULT '' NOT NULL,
	`origin` text DEFAULT '' NOT NULL,
	`cites_source` text DEFAULT '' NOT NULL,
	`start_mm` real,
	`mm_per_week` real,
	`heal_days` integer,
	`created_at` integer NOT NULL,
	`retired_at` integer,
	`version` integer DEFAULT 1 NOT NULL
);
--> statement-breakpoint
CREATE UNIQUE INDEX `line_code_unique` ON `line` (`code`);--> statement-breakpoint
CREATE TABLE `plug` (
	`code` text PRIMARY KEY NOT NULL,
	`batch_id` text NOT NULL,
	`number` integer NOT NULL,
	`account_id` text,
	`position` text,
	`created_at` integer NOT NULL,
	FOREIGN KEY (`batch_id`) REFERENCES `batch`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`account_id`) REFERENCES `stock_account`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE INDEX `plug_account` ON `plug` (`account_id`,`batch_id`);--> statement-breakpoint
CREATE UNIQUE INDEX `plug_number` ON `plug` (`batch_id`,`number`);--> statement-breakpoint
CREATE UNIQUE INDEX `plug_position` ON `plug` (`account_id`,`position`);--> statement-breakpoint
CREATE TABLE `size_reading` (
	`id` text PRIMARY KEY NOT NULL,
	`batch_id` text NOT NULL,
	`plug_code` text,
	`size_mm` real NOT NULL,
	`at` integer NOT NULL,
	`by` text NOT NULL,
	FOREIGN KEY (`batch_id`) REFERENCES `batch`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`plug_code`) REFERENCES `plug`(`code`) ON UPDATE no action ON DELETE no action,
	CONSTRAINT "size_reading_mm" CHECK("size_reading"."size_mm" > 0 AND "size_reading"."size_mm" < 2000)
);
--> statement-breakpoint
CREATE INDEX `size_reading_batch` ON `size_reading` (`batch_id`,`at`);--> statement-breakpoint
CREATE INDEX `size_reading_plug` ON `size_reading` (`plug_code`,`at`);--> statement-breakpoint
CREATE TABLE `stock_account` (
	`id` text PRIMARY KEY NOT NULL,
	`kind` text NOT NULL,
	`rack_id` text,
	`detail` text DEFAULT '' NOT NULL,
	`is_source` integer GENERATED ALWAYS AS (kind IN ('cut', 'count')) STORED,
	FOREIGN KEY (`rack_id`) REFERENCES `rack`(`id`) ON UPDATE no action ON DELETE no action,
	CONSTRAINT "stock_account_rack_named" CHECK(("stock_account"."kind" = 'rack') = ("stock_account"."rack_id" IS NOT NULL))
);
--> statement-breakpoint
CREATE UNIQUE INDEX `stock_account_kind` ON `stock_account` (`kind`,`detail`) WHERE "stock_account"."rack_id" IS NULL;--> statement-breakpoint
CREATE UNIQUE INDEX `stock_account_rack` ON `stock_account` (`rack_id`);--> statement-breakpoint
CREATE TABLE `stock_balance` (
	`batch_id` text NOT NULL,
	`account_id` text NOT NULL,
	`pieces` integer NOT NULL,
	`is_source` integer NOT NULL,
	PRIMARY KEY(`batch_id`, `account_id`),
	FOREIGN KEY (`batch_id`) REFERENCES `batch`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`account_id`) REFERENCES `stock_account`(`id`) ON UPDATE no action ON DELETE no action,
	CONSTRAINT "stock_balance_not_negative" CHECK("stock_balance"."is_source" = 1 OR "stock_balance"."pieces" >= 0)
);
--> statement-breakpoint
CREATE INDEX `stock_balance_account` ON `stock_balance` (`account_id`);--> statement-breakpoint
CREATE TABLE `stock_movement` (
	`id` integer PRIMARY KEY AUTOINCREMENT NOT NULL,
	`group_id` text NOT NULL,
	`kind` text NOT NULL,
	`batch_id` text NOT NULL,
	`plug_code` text,
	`from_account_id` text NOT NULL,
	`to_account_id` text NOT NULL,
	`from_position` text,
	`to_position` text,
	`pieces` integer NOT NULL,
	`seen` text DEFAULT '' NOT NULL,
	`note` text DEFAULT '' NOT NULL,
	`at` integer NOT NULL,
	`by` text NOT NULL,
	`recorded_at` integer NOT NULL,
	`reverses_id` integer,
	FOREIGN KEY (`batch_id`) REFERENCES `batch`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`plug_code`) REFERENCES `plug`(`code`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`from_account_id`) REFERENCES `stock_account`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`to_account_id`) REFERENCES `stock_account`(`id`) ON UPDATE no action ON DELETE no action,
	CONSTRAINT "stock_movement_pieces" CHECK("stock_movement"."pieces" > 0 AND ("stock_movement"."plug_code" IS NULL OR "stock_movement"."pieces" = 1)),
	CONSTRAINT "stock_movement_goes_somewhere" CHECK("stock_movement"."from_account_id" <> "stock_movement"."to_account_id" OR "stock_movement"."from_position" IS NOT "stock_movement"."to_position")
);
--> statement-breakpoint
CREATE INDEX `stock_movement_batch` ON `stock_movement` (`batch_id`,`at`);--> statement-breakpoint
CREATE INDEX `stock_movement_plug` ON `stock_movement` (`plug_code`);--> statement-breakpoint
CREATE INDEX `stock_movement_group` ON `stock_movement` (`group_id`);--> statement-breakpoint
CREATE INDEX `stock_movement_at` ON `stock_movement` (`at`);--> statement-breakpoint
CREATE UNIQUE INDEX `stock_movement_reversed_once` ON `stock_movement` (`reverses_id`);--> statement-breakpoint
CREATE TABLE `withhold` (
	`id` text PRIMARY KEY NOT NULL,
	`plug_code` text,
	`batch_id` text,
	`rack_id` text,
	`system_id` text,
	`reason` text NOT NULL,
	`started_at` integer NOT NULL,
	`started_by` text NOT NULL,
	`ended_at` integer,
	`ended_by` text,
	FOREIGN KEY (`plug_code`) REFERENCES `plug`(`code`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`batch_id`) REFERENCES `batch`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`rack_id`) REFERENCES `rack`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`system_id`) REFERENCES `system`(`id`) ON UPDATE no action ON DELETE no action,
	CONSTRAINT "withhold_names_one_thing" CHECK(("withhold"."plug_code" IS NOT NULL) + ("withhold"."batch_id" IS NOT NULL) + ("withhold"."rack_id" IS NOT NULL) + ("withhold"."system_id" IS NOT NULL) = 1)
);
--> statement-breakpoint
CREATE INDEX `withhold_open` ON `withhold` (`ended_at`);--> statement-breakpoint
CREATE TABLE `consumption` (
	`id` text PRIMARY KEY NOT NULL,
	`item_id` text NOT NULL,
	`lot_id` text NOT NULL,
	`quantity` real NOT NULL,
	`cost_micro` integer NOT NULL,
	`cause` text NOT NULL,
	`cause_id` text NOT NULL,
	`system_id` text,
	`at` integer NOT NULL,
	`by` text NOT NULL,
	FOREIGN KEY (`item_id`) REFERENCES `item`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`lot_id`) REFERENCES `lot`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`system_id`) REFERENCES `system`(`id`) ON UPDATE no action ON DELETE no action,
	CONSTRAINT "consumption_quantity" CHECK("consumption"."quantity" > 0 AND "consumption"."cost_micro" >= 0)
);
--> statement-breakpoint
CREATE INDEX `consumption_item` ON `consumption` (`item_id`,`at`);--> statement-breakpoint
CREATE INDEX `consumption_cause` ON `consumption` (`cause`,`cause_id`);--> statement-breakpoint
CREATE INDEX `consumption_system` ON `consumption` (`system_id`,`at`);--> statement-breakpoint
CREATE TABLE `item` (
	`id` text PRIMARY KEY NOT NULL,
	`code` text NOT NULL,
	`name` text NOT NULL,
	`kind` text NOT NULL,
	`unit` text NOT NULL,
	`pack_size` real NOT NULL,
	`lead_time_days` integer NOT NULL,
	`safety_days` integer NOT NULL,
	`supplier_id` text,
	`strength` real,
	`created_at` integer NOT NULL,
	`retired_at` integer,
	`version` integer DEFAULT 1 NOT NULL,
	FOREIGN KEY (`supplier_id`) REFERENCES `supplier`(`id`) ON UPDATE no action ON DELETE no action,
	CONSTRAINT "item_pack" CHECK("item"."pack_size" > 0 AND "item"."lead_time_days" >= 0 AND "item"."safety_days" >= 0)
);
--> statement-breakpoint
CREATE UNIQUE INDEX `item_code_unique` ON `item` (`code`);--> statement-breakpoint
CREATE TABLE `lot` (
	`id` text PRIMARY KEY NOT NULL,
	`item_id` text NOT NULL,
	`code` text NOT NULL,
	`received_on` text NOT NULL,
	`expires_on` text,
	`quantity` real NOT NULL,
	`remaining` real NOT NULL,
	`cost_minor` integer NOT NULL,
	`remaining_micro` integer NOT NULL,
	`received_by` text NOT NULL,
	`created_at` integer NOT NULL,
	FOREIGN KEY (`item_id`) REFERENCES `item`(`id`) ON UPDATE no action ON DELETE no action,
	CONSTRAINT "lot_remaining" CHECK("lot"."remaining" >= 0 AND "lot"."remaining" <= "lot"."quantity" AND "lot"."remaining_micro" >= 0)
);
--> statement-breakpoint
CREATE INDEX `lot_item` ON `lot` (`item_id`,`received_on`);--> statement-breakpoint
CREATE TABLE `supplier` (
	`id` text PRIMARY KEY NOT NULL,
	`name` text NOT NULL,
	`email` text DEFAULT '' NOT NULL,
	`created_at` integer NOT NULL,
	`version` integer DEFAULT 1 NOT NULL
);
--> statement-breakpoint
CREATE UNIQUE INDEX `supplier_name_unique` ON `supplier` (`name`);--> statement-breakpoint
CREATE TABLE `supply_count` (
	`id` text PRIMARY KEY NOT NULL,
	`item_id` text NOT NULL,
	`counted` real NOT NULL,
	`expected` real NOT NULL,
	`reason` text NOT NULL,
	`at` integer NOT NULL,
	`by` text NOT NULL,
	FOREIGN KEY (`item_id`) REFERENCES `item`(`id`) ON UPDATE no action ON DELETE no action,
	CONSTRAINT "supply_count_amounts" CHECK("supply_count"."counted" >= 0 AND "supply_count"."expected" >= 0)
);
--> statement-breakpoint
CREATE INDEX `supply_count_item` ON `supply_count` (`item_id`,`at`);--> statement-breakpoint
CREATE TABLE `cost_month` (
	`month` text PRIMARY KEY NOT NULL,
	`built_at` integer NOT NULL,
	`fingerprint` text NOT NULL
);
--> statement-breakpoint
CREATE TABLE `cost_share` (
	`month` text NOT NULL,
	`system_id` text NOT NULL,
	`batch_id` text NOT NULL,
	`part` text NOT NULL,
	`frag_days` integer NOT NULL,
	`cost_micro` integer NOT NULL,
	PRIMARY KEY(`batch_id`, `month`, `system_id`, `part`),
	FOREIGN KEY (`system_id`) REFERENCES `system`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`batch_id`) REFERENCES `batch`(`id`) ON UPDATE no action ON DELETE no action,
	CONSTRAINT "cost_share_not_negative" CHECK("cost_share"."cost_micro" >= 0 AND "cost_share"."frag_days" >= 0)
);
--> statement-breakpoint
CREATE INDEX `cost_share_month` ON `cost_share` (`month`,`system_id`);--> statement-breakpoint
CREATE TABLE `hold` (
	`id` text PRIMARY KEY NOT NULL,
	`order_line_id` text NOT NULL,
	`batch_id` text NOT NULL,
	`pieces` integer NOT NULL,
	`created_at` integer NOT NULL,
	FOREIGN KEY (`order_line_id`) REFERENCES `order_line`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`batch_id`) REFERENCES `batch`(`id`) ON UPDATE no action ON DELETE no action,
	CONSTRAINT "hold_pieces" CHECK("hold"."pieces" >= 0)
);
--> statement-breakpoint
CREATE INDEX `hold_batch` ON `hold` (`batch_id`);--> statement-breakpoint
CREATE UNIQUE INDEX `hold_once` ON `hold` (`order_line_id`,`batch_id`);--> statement-breakpoint
CREATE TABLE `invoice` (
	`id` text PRIMARY KEY NOT NULL,
	`number` integer NOT NULL,
	`order_id` text NOT NULL,
	`issued_on` text NOT NULL,
	`content` text NOT NULL,
	`created_at` integer NOT NULL,
	FOREIGN KEY (`order_id`) REFERENCES `order`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE UNIQUE INDEX `invoice_number_unique` ON `invoice` (`number`);--> statement-breakpoint
CREATE UNIQUE INDEX `invoice_order_id_unique` ON `invoice` (`order_id`);--> statement-breakpoint
CREATE TABLE `listing` (
	`id` text PRIMARY KEY NOT NULL,
	`line_id` text NOT NULL,
	`grade` text NOT NULL,
	`price_minor` integer NOT NULL,
	`active` integer DEFAULT true NOT NULL,
	`created_at` integer NOT NULL,
	`version` integer DEFAULT 1 NOT NULL,
	FOREIGN KEY (`line_id`) REFERENCES `line`(`id`) ON UPDATE no action ON DELETE no action,
	CONSTRAINT "listing_price" CHECK("listing"."price_minor" >= 0)
);
--> statement-breakpoint
CREATE UNIQUE INDEX `listing_once` ON `listing` (`line_id`,`grade`);--> statement-breakpoint
CREATE TABLE `order_line` (
	`id` text PRIMARY KEY NOT NULL,
	`order_id` text NOT NULL,
	`listing_id` text NOT NULL,
	`line_id` text NOT NULL,
	`grade` text NOT NULL,
	`quantity` integer NOT NULL,
	`missing` integer DEFAULT 0 NOT NULL,
	`price_minor` integer NOT NULL,
	FOREIGN KEY (`order_id`) REFERENCES `order`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`listing_id`) REFERENCES `listing`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`line_id`) REFERENCES `line`(`id`) ON UPDATE no action ON DELETE no action,
	CONSTRAINT "order_line_quantity" CHECK("order_line"."quantity" > 0),
	CONSTRAINT "order_line_missing" CHECK("order_line"."missing" BETWEEN 0 AND "order_line"."quantity")
);
--> statement-breakpoint
CREATE INDEX `order_line_order` ON `order_line` (`order_id`);--> statement-breakpoint
CREATE TABLE `order` (
	`id` text PRIMARY KEY NOT NULL,
	`number` integer NOT NULL,
	`store_id` text NOT NULL,
	`state` text NOT NULL,
	`currency` text NOT NULL,
	`subtotal_minor` integer NOT NULL,
	`tax_minor` integer NOT NULL,
	`total_minor` integer NOT NULL,
	`tax_percent_hundredths` integer DEFAULT 0 NOT NULL,
	`ship_on` text,
	`note` text DEFAULT '' NOT NULL,
	`placed_at` integer NOT NULL,
	`placed_by` text NOT NULL,
	`hold_until` integer,
	`paid_at` integer,
	`packed_at` integer,
	`shipped_at` integer,
	`cancelled_at` integer,
	`cancel_reason` text DEFAULT '' NOT NULL,
	`carrier` text DEFAULT '' NOT NULL,
	`tracking` text DEFAULT '' NOT NULL,
	`boxes` integer DEFAULT 0 NOT NULL,
	`version` integer DEFAULT 1 NOT NULL,
	FOREIGN KEY (`store_id`) REFERENCES `store`(`id`) ON UPDATE no action ON DELETE no action,
	CONSTRAINT "order_total" CHECK("order"."total_minor" = "order"."subtotal_minor" + "order"."tax_minor")
);
--> statement-breakpoint
CREATE UNIQUE INDEX `order_number_unique` ON `order` (`number`);--> statement-breakpoint
CREATE INDEX `order_store` ON `order` (`store_id`,`number`);--> statement-breakpoint
CREATE INDEX `order_state` ON `order` (`state`,`number`);--> statement-breakpoint
CREATE TABLE `payment_event` (
	`id` text PRIMARY KEY NOT NULL,
	`type` text NOT NULL,
	`at` integer NOT NULL
);
--> statement-breakpoint
CREATE TABLE `payment` (
	`id` text PRIMARY KEY NOT NULL,
	`order_id` text NOT NULL,
	`session_id` text NOT NULL,
	`intent_id` text,
	`url` text NOT NULL,
	`amount_minor` integer NOT NULL,
	`currency` text NOT NULL,
	`state` text NOT NULL,
	`refusal` text DEFAULT '' NOT NULL,
	`created_at` integer NOT NULL,
	`paid_at` integer,
	FOREIGN KEY (`order_id`) REFERENCES `order`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE UNIQUE INDEX `payment_session_id_unique` ON `payment` (`session_id`);--> statement-breakpoint
CREATE INDEX `payment_order` ON `payment` (`order_id`);--> statement-breakpoint
CREATE INDEX `payment_intent` ON `payment` (`intent_id`);--> statement-breakpoint
CREATE INDEX `payment_state` ON `payment` (`state`);--> statement-breakpoint
CREATE TABLE `pick` (
	`id` text PRIMARY KEY NOT NULL,
	`order_line_id` text NOT NULL,
	`plug_code` text NOT NULL,
	`movement_id` integer NOT NULL,
	`hold_id` text,
	`at` integer NOT NULL,
	`by` text NOT NULL,
	`undone_at` integer,
	FOREIGN KEY (`order_line_id`) REFERENCES `order_line`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`plug_code`) REFERENCES `plug`(`code`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`hold_id`) REFERENCES `hold`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE INDEX `pick_order_line` ON `pick` (`order_line_id`);--> statement-breakpoint
CREATE INDEX `pick_plug` ON `pick` (`plug_code`);--> statement-breakpoint
CREATE TABLE `refund` (
	`id` text PRIMARY KEY NOT NULL,
	`payment_id` text NOT NULL,
	`external_id` text,
	`amount_minor` integer NOT NULL,
	`reason` text NOT NULL,
	`state` text NOT NULL,
	`created_at` integer NOT NULL,
	`by` text NOT NULL,
	FOREIGN KEY (`payment_id`) REFERENCES `payment`(`id`) ON UPDATE no action ON DELETE no action,
	CONSTRAINT "refund_amount" CHECK("refund"."amount_minor" > 0)
);
--> statement-breakpoint
CREATE UNIQUE INDEX `refund_external_id_unique` ON `refund` (`external_id`);--> statement-breakpoint
CREATE INDEX `refund_payment` ON `refund` (`payment_id`);--> statement-breakpoint
CREATE INDEX `refund_state` ON `refund` (`state`);--> statement-breakpoint
CREATE TABLE `store` (
	`id` text PRIMARY KEY NOT NULL,
	`code` text NOT NULL,
	`name` text NOT NULL,
	`email` text NOT NULL,
	`phone` text DEFAULT '' NOT NULL,
	`address` text DEFAULT '' NOT NULL,
	`created_at` integer NOT NULL,
	`retired_at` integer,
	`version` integer DEFAULT 1 NOT NULL
);
--> statement-breakpoint
CREATE UNIQUE INDEX `store_code_unique` ON `store` (`code`);