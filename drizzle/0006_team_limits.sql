CREATE TABLE `team_limits` (
	`id` bigint unsigned AUTO_INCREMENT NOT NULL,
	`team_id` bigint unsigned NOT NULL,
	`tag` varchar(32) CHARACTER SET utf8mb4 COLLATE utf8mb4_bin NOT NULL,
	`limits` json NOT NULL,
	`version` int unsigned NOT NULL DEFAULT 1,
	`created_at` datetime(3) NOT NULL DEFAULT CURRENT_TIMESTAMP(3),
	CONSTRAINT `team_limits_id` PRIMARY KEY(`id`),
	CONSTRAINT `team_limits_tag` UNIQUE(`team_id`,`tag`)
);
--> statement-breakpoint
ALTER TABLE `team_limits` ADD CONSTRAINT `team_limits_team_id_teams_id_fk` FOREIGN KEY (`team_id`) REFERENCES `teams`(`id`) ON DELETE cascade ON UPDATE no action;