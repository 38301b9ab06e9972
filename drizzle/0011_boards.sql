CREATE TABLE `board_revisions` (
	`id` bigint unsigned AUTO_INCREMENT NOT NULL,
	`team_id` bigint unsigned NOT NULL,
	`board_id` bigint unsigned NOT NULL,
	`number` int unsigned NOT NULL,
	`output_kind` enum('ladder','on-chip','serial','pwm') NOT NULL,
	`bits` tinyint unsigned NOT NULL,
	`board` json NOT NULL,
	`digest` varchar(64) CHARACTER SET utf8mb4 COLLATE utf8mb4_bin NOT NULL,
	`note` varchar(2000) NOT NULL DEFAULT '',
	`made_by` bigint unsigned,
	`created_at` datetime(3) NOT NULL DEFAULT CURRENT_TIMESTAMP(3),
	CONSTRAINT `board_revisions_id` PRIMARY KEY(`id`),
	CONSTRAINT `board_revisions_number` UNIQUE(`team_id`,`board_id`,`number`),
	CONSTRAINT `board_revisions_team_id` UNIQUE(`team_id`,`id`)
);
--> statement-breakpoint
CREATE TABLE `boards` (
	`id` bigint unsigned AUTO_INCREMENT NOT NULL,
	`team_id` bigint unsigned NOT NULL,
	`slug` varchar(70) CHARACTER SET utf8mb4 COLLATE utf8mb4_bin NOT NULL,
	`name` varchar(64) NOT NULL,
	`output_kind` enum('ladder','on-chip','serial','pwm') NOT NULL,
	`bits` tinyint unsigned NOT NULL,
	`is_retired` boolean NOT NULL DEFAULT false,
	`version` int unsigned NOT NULL DEFAULT 1,
	`latest_revision` int unsigned NOT NULL,
	`created_by` bigint unsigned,
	`created_at` datetime(3) NOT NULL DEFAULT CURRENT_TIMESTAMP(3),
	`changed_by` bigint unsigned,
	`changed_at` datetime(3) NOT NULL,
	CONSTRAINT `boards_id` PRIMARY KEY(`id`),
	CONSTRAINT `boards_slug` UNIQUE(`team_id`,`slug`),
	CONSTRAINT `boards_team_id` UNIQUE(`team_id`,`id`)
);
--> statement-breakpoint
ALTER TABLE `board_revisions` ADD CONSTRAINT `board_revisions_made_by_users_id_fk` FOREIGN KEY (`made_by`) REFERENCES `users`(`id`) ON DELETE set null ON UPDATE no action;--> statement-breakpoint
ALTER TABLE `board_revisions` ADD CONSTRAINT `board_revisions_board_fk` FOREIGN KEY (`team_id`,`board_id`) REFERENCES `boards`(`team_id`,`id`) ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE `boards` ADD CONSTRAINT `boards_team_id_teams_id_fk` FOREIGN KEY (`team_id`) REFERENCES `teams`(`id`) ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE `boards` ADD CONSTRAINT `boards_created_by_users_id_fk` FOREIGN KEY (`created_by`) REFERENCES `users`(`id`) ON DELETE set null ON UPDATE no action;--> statement-breakpoint
ALTER TABLE `boards` ADD CONSTRAINT `boards_changed_by_users_id_fk` FOREIGN KEY (`changed_by`) REFERENCES `users`(`id`) ON DELETE set null ON UPDATE no action;--> statement-breakpoint
CREATE INDEX `boards_name` ON `boards` (`team_id`,`is_retired`,`name`,`id`);