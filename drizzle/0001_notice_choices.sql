CREATE TABLE `notice_choices` (
	`user_id` bigint unsigned NOT NULL,
	`kind` enum('review-asked','verdict','comment','withdrawal') NOT NULL,
	`is_wanted` boolean NOT NULL,
	`changed_at` datetime(3) NOT NULL,
	CONSTRAINT `notice_choices_user_id_kind_pk` PRIMARY KEY(`user_id`,`kind`)
);
--> statement-breakpoint
ALTER TABLE `notice_choices` ADD CONSTRAINT `notice_choices_user_id_users_id_fk` FOREIGN KEY (`user_id`) REFERENCES `users`(`id`) ON DELETE cascade ON UPDATE no action;