CREATE TABLE `invitations` (
	`id` text PRIMARY KEY NOT NULL,
	`survey_id` text,
	`role` text,
	`makes_owner` integer NOT NULL,
	`email` text NOT NULL,
	`secret_sha256` text NOT NULL,
	`invited_by` text NOT NULL,
	`created_at` text NOT NULL,
	`expires_at` text NOT NULL,
	`accepted_at` text,
	`withdrawn_at` text,
	FOREIGN KEY (`survey_id`) REFERENCES `surveys`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`invited_by`) REFERENCES `accounts`(`id`) ON UPDATE no action ON DELETE no action,
	CONSTRAINT "invitations_role" CHECK(("invitations"."survey_id" is null) = ("invitations"."role" is null))
);
--> statement-breakpoint
CREATE UNIQUE INDEX `invitations_secretSha256_unique` ON `invitations` (`secret_sha256`);--> statement-breakpoint
CREATE INDEX `invitations_survey` ON `invitations` (`survey_id`);--> statement-breakpoint
CREATE TABLE `password_resets` (
	`id` text PRIMARY KEY NOT NULL,
	`account_id` text NOT NULL,
	`secret_sha256` text NOT NULL,
	`created_at` text NOT NULL,
	`expires_at` text NOT NULL,
	`used_at` text,
	FOREIGN KEY (`account_id`) REFERENCES `accounts`(`id`) ON UPDATE no action ON DELETE cascade
);
--> statement-breakpoint
CREATE UNIQUE INDEX `password_resets_secretSha256_unique` ON `password_resets` (`secret_sha256`);--> statement-breakpoint
CREATE TABLE `sign_in_failures` (
	`id` integer PRIMARY KEY AUTOINCREMENT NOT NULL,
	`email` text NOT NULL,
	`source` text NOT NULL,
	`at` text NOT NULL
);
--> statement-breakpoint
CREATE INDEX `sign_in_failures_email` ON `sign_in_failures` (`email`,`at`);--> statement-breakpoint
CREATE INDEX `sign_in_failures_source` ON `sign_in_failures` (`source`,`at`);--> statement-breakpoint
CREATE TABLE `deleted_surveys` (
	`id` text PRIMARY KEY NOT NULL,
	`newest_sequence` integer NOT NULL,
	`newest_sha256` text NOT NULL,
	`deleted_at` text NOT NULL,
	`deleted_by` text NOT NULL,
	FOREIGN KEY (`deleted_by`) REFERENCES `accounts`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE TABLE `installation` (
	`id` integer PRIMARY KEY NOT NULL,
	`public_address` text,
	`base_map_url` text,
	`base_map_attribution` text,
	CONSTRAINT "installation_one_row" CHECK("installation"."id" = 1)
);
--> statement-breakpoint
CREATE TABLE `mails` (
	`id` text PRIMARY KEY NOT NULL,
	`kind` text NOT NULL,
	`survey_id` text,
	`about` text,
	`to_address` text NOT NULL,
	`to_name` text NOT NULL,
	`subject` text NOT NULL,
	`text` text NOT NULL,
	`html` text NOT NULL,
	`secret` integer NOT NULL,
	`state` text NOT NULL,
	`attempts` integer NOT NULL,
	`next_attempt_at` text,
	`last_error` text NOT NULL,
	`created_at` text NOT NULL,
	`sent_at` text,
	FOREIGN KEY (`survey_id`) REFERENCES `surveys`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE UNIQUE INDEX `mails_about_unique` ON `mails` (`about`);--> statement-breakpoint
CREATE INDEX `mails_next` ON `mails` (`state`,`next_attempt_at`);--> statement-breakpoint
CREATE INDEX `mails_survey` ON `mails` (`survey_id`);--> statement-breakpoint
ALTER TABLE `accounts` ADD `closed_at` text;