ALTER TABLE `deleted_surveys` ADD `source_sha256s` text DEFAULT '[]' NOT NULL;--> statement-breakpoint
ALTER TABLE `deleted_surveys` ADD `frame_sha256s` text DEFAULT '[]' NOT NULL;