CREATE TABLE `uploads` (
	`id` bigint unsigned AUTO_INCREMENT NOT NULL,
	`team_id` bigint unsigned NOT NULL,
	`revision_id` bigint unsigned NOT NULL,
	`name` varchar(120) NOT NULL,
	`kind` enum('recording','columns','c','assembly','intel-hex') NOT NULL,
	`bytes` int unsigned NOT NULL,
	`sha256` varchar(64) CHARACTER SET utf8mb4 COLLATE utf8mb4_bin NOT NULL,
	`content` mediumblob NOT NULL,
	`kept_by` bigint unsigned,
	`created_at` datetime(3) NOT NULL DEFAULT CURRENT_TIMESTAMP(3),
	CONSTRAINT `uploads_id` PRIMARY KEY(`id`),
	CONSTRAINT `uploads_revision` UNIQUE(`team_id`,`revision_id`,`sha256`)
);
--> statement-breakpoint
ALTER TABLE `uploads` ADD CONSTRAINT `uploads_kept_by_users_id_fk` FOREIGN KEY (`kept_by`) REFERENCES `users`(`id`) ON DELETE set null ON UPDATE no action;--> statement-breakpoint
ALTER TABLE `uploads` ADD CONSTRAINT `uploads_revision_fk` FOREIGN KEY (`team_id`,`revision_id`) REFERENCES `revisions`(`team_id`,`id`) ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
CREATE INDEX `uploads_bytes` ON `uploads` (`team_id`,`bytes`);