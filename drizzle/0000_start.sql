CREATE TABLE `accounts` (
	`id` text PRIMARY KEY NOT NULL,
	`email` text NOT NULL,
	`name` text NOT NULL,
	`password_hash` text NOT NULL,
	`is_owner` integer NOT NULL,
	`created_at` text NOT NULL,
	CONSTRAINT "accounts_email_lower" CHECK("accounts"."email" = lower("accounts"."email"))
);
--> statement-breakpoint
CREATE UNIQUE INDEX `accounts_email_unique` ON `accounts` (`email`);--> statement-breakpoint
CREATE TABLE `members` (
	`id` text PRIMARY KEY NOT NULL,
	`survey_id` text NOT NULL,
	`account_id` text NOT NULL,
	`added_at` text NOT NULL,
	FOREIGN KEY (`survey_id`) REFERENCES `surveys`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`account_id`) REFERENCES `accounts`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE UNIQUE INDEX `members_person` ON `members` (`survey_id`,`account_id`);--> statement-breakpoint
CREATE TABLE `memberships` (
	`member_id` text NOT NULL,
	`role` text NOT NULL,
	`added_at` text NOT NULL,
	`removed_at` text,
	PRIMARY KEY(`member_id`, `role`),
	FOREIGN KEY (`member_id`) REFERENCES `members`(`id`) ON UPDATE no action ON DELETE no action,
	CONSTRAINT "memberships_role" CHECK("memberships"."role" in ('planner', 'lead', 'counter', 'auditor'))
);
--> statement-breakpoint
CREATE TABLE `sessions` (
	`id` text PRIMARY KEY NOT NULL,
	`account_id` text NOT NULL,
	`created_at` text NOT NULL,
	`last_seen_at` text NOT NULL,
	`expires_at` text NOT NULL,
	`user_agent` text NOT NULL,
	FOREIGN KEY (`account_id`) REFERENCES `accounts`(`id`) ON UPDATE no action ON DELETE cascade
);
--> statement-breakpoint
CREATE TABLE `tokens` (
	`id` text PRIMARY KEY NOT NULL,
	`account_id` text NOT NULL,
	`name` text NOT NULL,
	`secret_sha256` text NOT NULL,
	`scope` text NOT NULL,
	`created_at` text NOT NULL,
	`expires_at` text,
	`revoked_at` text,
	`last_used_at` text,
	FOREIGN KEY (`account_id`) REFERENCES `accounts`(`id`) ON UPDATE no action ON DELETE cascade
);
--> statement-breakpoint
CREATE UNIQUE INDEX `tokens_secretSha256_unique` ON `tokens` (`secret_sha256`);--> statement-breakpoint
CREATE TABLE `area_versions` (
	`id` text PRIMARY KEY NOT NULL,
	`survey_id` text NOT NULL,
	`number` integer NOT NULL,
	`file_name` text NOT NULL,
	`file_bytes` blob NOT NULL,
	`file_sha256` text NOT NULL,
	`geometry` text NOT NULL,
	`report` text NOT NULL,
	`outline` text NOT NULL,
	`outline_simplified` integer NOT NULL,
	`suggested_crs` text NOT NULL,
	`imported_by` text NOT NULL,
	`created_at` text NOT NULL,
	FOREIGN KEY (`survey_id`) REFERENCES `surveys`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`imported_by`) REFERENCES `members`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE UNIQUE INDEX `area_versions_number` ON `area_versions` (`survey_id`,`number`);--> statement-breakpoint
CREATE TABLE `planes` (
	`area_version_id` text NOT NULL,
	`epsg` integer NOT NULL,
	`crs_name` text NOT NULL,
	`crs_text` text NOT NULL,
	`rings` text NOT NULL,
	`rings_sha256` text NOT NULL,
	`plane_area_square_metres` real NOT NULL,
	`geodesic_area_square_metres` real NOT NULL,
	`notes` text NOT NULL,
	`net` text NOT NULL,
	`created_at` text NOT NULL,
	PRIMARY KEY(`area_version_id`, `epsg`),
	FOREIGN KEY (`area_version_id`) REFERENCES `area_versions`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE TABLE `zones` (
	`id` text PRIMARY KEY NOT NULL,
	`area_version_id` text NOT NULL,
	`kind` text NOT NULL,
	`name` text NOT NULL,
	`position` integer NOT NULL,
	`reason` text NOT NULL,
	`geometry` text NOT NULL,
	`source_sha256` text,
	`created_at` text NOT NULL,
	FOREIGN KEY (`area_version_id`) REFERENCES `area_versions`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE TABLE `count_entries` (
	`id` text PRIMARY KEY NOT NULL,
	`visit_id` text NOT NULL,
	`target_id` text NOT NULL,
	`observer_id` text NOT NULL,
	`purpose` text NOT NULL,
	`state` text NOT NULL,
	`value` real,
	`replaces` text,
	`reason` text NOT NULL,
	`note` text NOT NULL,
	`import_id` text,
	`entered_by` text NOT NULL,
	`entered_at` text NOT NULL,
	`made_at` text NOT NULL,
	FOREIGN KEY (`visit_id`) REFERENCES `visits`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`target_id`) REFERENCES `targets`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`observer_id`) REFERENCES `members`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`replaces`) REFERENCES `count_entries`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`import_id`) REFERENCES `count_imports`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`entered_by`) REFERENCES `members`(`id`) ON UPDATE no action ON DELETE no action,
	CONSTRAINT "count_entries_value" CHECK(("count_entries"."state" = 'counted') = ("count_entries"."value" is not null)),
	CONSTRAINT "count_entries_not_negative" CHECK("count_entries"."value" is null or "count_entries"."value" >= 0)
);
--> statement-breakpoint
CREATE UNIQUE INDEX `count_entries_first` ON `count_entries` (`visit_id`,`target_id`) WHERE purpose = 'first' and replaces is null;--> statement-breakpoint
CREATE UNIQUE INDEX `count_entries_replaces` ON `count_entries` (`replaces`) WHERE replaces is not null;--> statement-breakpoint
CREATE TABLE `count_imports` (
	`id` text PRIMARY KEY NOT NULL,
	`survey_id` text NOT NULL,
	`file_name` text NOT NULL,
	`sha256` text NOT NULL,
	`columns` text NOT NULL,
	`written` integer NOT NULL,
	`imported_by` text NOT NULL,
	`imported_at` text NOT NULL,
	FOREIGN KEY (`survey_id`) REFERENCES `surveys`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`imported_by`) REFERENCES `members`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE TABLE `declarations` (
	`id` text PRIMARY KEY NOT NULL,
	`survey_id` text NOT NULL,
	`season_id` text NOT NULL,
	`frame_version_id` text NOT NULL,
	`text` text NOT NULL,
	`sha256` text NOT NULL,
	`declared_by` text NOT NULL,
	`declared_at` text NOT NULL,
	FOREIGN KEY (`survey_id`) REFERENCES `surveys`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`season_id`) REFERENCES `seasons`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`frame_version_id`) REFERENCES `frame_versions`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`declared_by`) REFERENCES `members`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE TABLE `declarations_abandoned` (
	`declaration_id` text PRIMARY KEY NOT NULL,
	`reason` text NOT NULL,
	`abandoned_by` text NOT NULL,
	`abandoned_at` text NOT NULL,
	FOREIGN KEY (`declaration_id`) REFERENCES `declarations`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`abandoned_by`) REFERENCES `members`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE TABLE `draw_entries` (
	`draw_id` text NOT NULL,
	`stratum` text NOT NULL,
	`position` integer NOT NULL,
	`unit` integer NOT NULL,
	`column` integer NOT NULL,
	`row` integer NOT NULL,
	`label` text NOT NULL,
	`repeat_of` integer,
	`reserve` integer NOT NULL,
	PRIMARY KEY(`draw_id`, `stratum`, `position`),
	FOREIGN KEY (`draw_id`) REFERENCES `draws`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE TABLE `draws` (
	`id` text PRIMARY KEY NOT NULL,
	`survey_id` text NOT NULL,
	`number` integer NOT NULL,
	`declaration_id` text NOT NULL,
	`frame_version_id` text NOT NULL,
	`drawn_by` text NOT NULL,
	`drawn_at` text NOT NULL,
	FOREIGN KEY (`survey_id`) REFERENCES `surveys`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`declaration_id`) REFERENCES `declarations`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`frame_version_id`) REFERENCES `frame_versions`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`drawn_by`) REFERENCES `members`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE UNIQUE INDEX `draws_declarationId_unique` ON `draws` (`declaration_id`);--> statement-breakpoint
CREATE UNIQUE INDEX `draws_number` ON `draws` (`survey_id`,`number`);--> statement-breakpoint
CREATE TABLE `draws_withdrawn` (
	`draw_id` text PRIMARY KEY NOT NULL,
	`reason` text NOT NULL,
	`withdrawn_by` text NOT NULL,
	`withdrawn_at` text NOT NULL,
	FOREIGN KEY (`draw_id`) REFERENCES `draws`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`withdrawn_by`) REFERENCES `members`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE TABLE `season_draws` (
	`id` text PRIMARY KEY NOT NULL,
	`season_id` text NOT NULL,
	`draw_id` text NOT NULL,
	`taken_at` text NOT NULL,
	`ended_at` text,
	FOREIGN KEY (`season_id`) REFERENCES `seasons`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`draw_id`) REFERENCES `draws`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE UNIQUE INDEX `season_draws_live` ON `season_draws` (`season_id`) WHERE ended_at is null;--> statement-breakpoint
CREATE TABLE `seeds` (
	`declaration_id` text PRIMARY KEY NOT NULL,
	`text` text NOT NULL,
	`source` text NOT NULL,
	`given_by` text NOT NULL,
	`given_at` text NOT NULL,
	FOREIGN KEY (`declaration_id`) REFERENCES `declarations`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`given_by`) REFERENCES `members`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE TABLE `assignments` (
	`visit_id` text PRIMARY KEY NOT NULL,
	`member_id` text NOT NULL,
	`day` text NOT NULL,
	`assigned_at` text NOT NULL,
	FOREIGN KEY (`visit_id`) REFERENCES `visits`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`member_id`) REFERENCES `members`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE TABLE `pick_acts` (
	`draw_id` text NOT NULL,
	`season_id` text NOT NULL,
	`sequence` integer NOT NULL,
	`kind` text NOT NULL,
	`stratum` text NOT NULL,
	`unit` integer,
	`count` integer,
	`state` text,
	`reason` text NOT NULL,
	`acted_by` text NOT NULL,
	`acted_at` text NOT NULL,
	PRIMARY KEY(`draw_id`, `season_id`, `sequence`),
	FOREIGN KEY (`draw_id`) REFERENCES `draws`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`season_id`) REFERENCES `seasons`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`acted_by`) REFERENCES `members`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE TABLE `visits` (
	`id` text PRIMARY KEY NOT NULL,
	`survey_id` text NOT NULL,
	`season_id` text NOT NULL,
	`frame_version_id` text NOT NULL,
	`unit` integer NOT NULL,
	`column` integer NOT NULL,
	`row` integer NOT NULL,
	`opened_at` text NOT NULL,
	FOREIGN KEY (`survey_id`) REFERENCES `surveys`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`season_id`) REFERENCES `seasons`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`frame_version_id`) REFERENCES `frame_versions`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE UNIQUE INDEX `visits_cell` ON `visits` (`season_id`,`frame_version_id`,`unit`);--> statement-breakpoint
CREATE TABLE `frame_versions` (
	`id` text PRIMARY KEY NOT NULL,
	`survey_id` text NOT NULL,
	`number` integer NOT NULL,
	`area_version_id` text NOT NULL,
	`kind` text NOT NULL,
	`spec` text NOT NULL,
	`draft_sha256` text NOT NULL,
	`statement` text,
	`frame_sha256` text,
	`list_sha256` text,
	`units` integer,
	`cells` blob,
	`cells_format` integer,
	`summary` text,
	`sealed_at` text,
	`sealed_by` text,
	`created_at` text NOT NULL,
	FOREIGN KEY (`survey_id`) REFERENCES `surveys`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`area_version_id`) REFERENCES `area_versions`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`sealed_by`) REFERENCES `members`(`id`) ON UPDATE no action ON DELETE no action,
	CONSTRAINT "frame_versions_sealed_whole" CHECK("frame_versions"."sealed_at" is null or ("frame_versions"."statement" is not null and "frame_versions"."frame_sha256" is not null and "frame_versions"."list_sha256" is not null and "frame_versions"."units" is not null and "frame_versions"."cells" is not null and "frame_versions"."cells_format" is not null and "frame_versions"."sealed_by" is not null))
);
--> statement-breakpoint
CREATE UNIQUE INDEX `frame_versions_number` ON `frame_versions` (`survey_id`,`number`);--> statement-breakpoint
CREATE TABLE `events` (
	`survey_id` text NOT NULL,
	`sequence` integer NOT NULL,
	`at` text NOT NULL,
	`member_id` text NOT NULL,
	`kind` text NOT NULL,
	`previous_sha256` text NOT NULL,
	`salt` text NOT NULL,
	`payload` text NOT NULL,
	`payload_sha256` text NOT NULL,
	`sha256` text NOT NULL,
	`signature` text NOT NULL,
	PRIMARY KEY(`survey_id`, `sequence`),
	FOREIGN KEY (`survey_id`) REFERENCES `surveys`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`member_id`) REFERENCES `members`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE UNIQUE INDEX `events_sha256_unique` ON `events` (`sha256`);--> statement-breakpoint
CREATE TABLE `kept_estimates` (
	`id` text PRIMARY KEY NOT NULL,
	`survey_id` text NOT NULL,
	`season_id` text NOT NULL,
	`target_id` text NOT NULL,
	`settings` text NOT NULL,
	`result` text NOT NULL,
	`kept_by` text NOT NULL,
	`kept_at` text NOT NULL,
	FOREIGN KEY (`survey_id`) REFERENCES `surveys`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`season_id`) REFERENCES `seasons`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`target_id`) REFERENCES `targets`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`kept_by`) REFERENCES `members`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE TABLE `seasons` (
	`id` text PRIMARY KEY NOT NULL,
	`survey_id` text NOT NULL,
	`position` integer NOT NULL,
	`name` text NOT NULL,
	`starts_on` text,
	`ends_on` text,
	`created_at` text NOT NULL,
	FOREIGN KEY (`survey_id`) REFERENCES `surveys`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE UNIQUE INDEX `seasons_order` ON `seasons` (`survey_id`,`position`);--> statement-breakpoint
CREATE TABLE `surveys` (
	`id` text PRIMARY KEY NOT NULL,
	`name` text NOT NULL,
	`time_zone` text NOT NULL,
	`level` text NOT NULL,
	`sensitivity` text NOT NULL,
	`safety_notes` text NOT NULL,
	`created_at` text NOT NULL,
	`archived_at` text
);
--> statement-breakpoint
CREATE TABLE `targets` (
	`id` text PRIMARY KEY NOT NULL,
	`survey_id` text NOT NULL,
	`position` integer NOT NULL,
	`singular` text NOT NULL,
	`plural` text NOT NULL,
	`counting_rule` text NOT NULL,
	`whole_numbers` integer NOT NULL,
	FOREIGN KEY (`survey_id`) REFERENCES `surveys`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE UNIQUE INDEX `targets_order` ON `targets` (`survey_id`,`position`);