CREATE TABLE `reviews` (
	`id` bigint unsigned AUTO_INCREMENT NOT NULL,
	`team_id` bigint unsigned NOT NULL,
	`revision_id` bigint unsigned NOT NULL,
	`made_by` bigint unsigned,
	`submitted_by` bigint unsigned,
	`submitted_at` datetime(3) NOT NULL,
	`message` varchar(2000) NOT NULL,
	`failed_limits` smallint unsigned NOT NULL,
	`verdict` enum('vetted','returned'),
	`decided_by` bigint unsigned,
	`decided_at` datetime(3),
	`note` varchar(2000) NOT NULL DEFAULT '',
	`limits` json,
	`withdrawn_by` bigint unsigned,
	`withdrawn_at` datetime(3),
	`reason` varchar(2000) NOT NULL DEFAULT '',
	CONSTRAINT `reviews_id` PRIMARY KEY(`id`),
	CONSTRAINT `reviews_revision` UNIQUE(`team_id`,`revision_id`)
);
--> statement-breakpoint
ALTER TABLE `reviews` ADD CONSTRAINT `reviews_made_by_users_id_fk` FOREIGN KEY (`made_by`) REFERENCES `users`(`id`) ON DELETE set null ON UPDATE no action;--> statement-breakpoint
ALTER TABLE `reviews` ADD CONSTRAINT `reviews_submitted_by_users_id_fk` FOREIGN KEY (`submitted_by`) REFERENCES `users`(`id`) ON DELETE set null ON UPDATE no action;--> statement-breakpoint
ALTER TABLE `reviews` ADD CONSTRAINT `reviews_decided_by_users_id_fk` FOREIGN KEY (`decided_by`) REFERENCES `users`(`id`) ON DELETE set null ON UPDATE no action;--> statement-breakpoint
ALTER TABLE `reviews` ADD CONSTRAINT `reviews_withdrawn_by_users_id_fk` FOREIGN KEY (`withdrawn_by`) REFERENCES `users`(`id`) ON DELETE set null ON UPDATE no action;--> statement-breakpoint
ALTER TABLE `reviews` ADD CONSTRAINT `reviews_revision_fk` FOREIGN KEY (`team_id`,`revision_id`) REFERENCES `revisions`(`team_id`,`id`) ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
CREATE INDEX `reviews_waiting` ON `reviews` (`team_id`,`verdict`,`submitted_at`,`id`,`submitted_by`,`made_by`);--> statement-breakpoint
CREATE INDEX `reviews_mine` ON `reviews` (`team_id`,`submitted_by`,`submitted_at`,`id`);--> statement-breakpoint
CREATE INDEX `reviews_decided` ON `reviews` (`team_id`,`decided_at`,`id`);