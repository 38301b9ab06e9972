CREATE TABLE `comments` (
	`id` bigint unsigned AUTO_INCREMENT NOT NULL,
	`team_id` bigint unsigned NOT NULL,
	`revision_id` bigint unsigned NOT NULL,
	`written_by` bigint unsigned,
	`text` varchar(2000) NOT NULL,
	`path` varchar(200) CHARACTER SET utf8mb4 COLLATE utf8mb4_bin,
	`created_at` datetime(3) NOT NULL DEFAULT CURRENT_TIMESTAMP(3),
	CONSTRAINT `comments_id` PRIMARY KEY(`id`)
);
--> statement-breakpoint
ALTER TABLE `comments` ADD CONSTRAINT `comments_written_by_users_id_fk` FOREIGN KEY (`written_by`) REFERENCES `users`(`id`) ON DELETE set null ON UPDATE no action;--> statement-breakpoint
ALTER TABLE `comments` ADD CONSTRAINT `comments_revision_fk` FOREIGN KEY (`team_id`,`revision_id`) REFERENCES `revisions`(`team_id`,`id`) ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
CREATE INDEX `comments_of_revision` ON `comments` (`team_id`,`revision_id`,`id`);