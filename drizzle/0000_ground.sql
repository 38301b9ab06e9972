CREATE TABLE `audit_events` (
	`team_id` bigint unsigned NOT NULL,
	`sequence` bigint unsigned NOT NULL,
	`at` datetime(3) NOT NULL,
	`actor_id` bigint unsigned NOT NULL,
	`actor_name` varchar(100) NOT NULL,
	`action` varchar(60) CHARACTER SET utf8mb4 COLLATE utf8mb4_bin NOT NULL,
	`subject` varchar(160) CHARACTER SET utf8mb4 COLLATE utf8mb4_bin NOT NULL,
	`details` json NOT NULL,
	`mac` varchar(64) CHARACTER SET utf8mb4 COLLATE utf8mb4_bin NOT NULL,
	CONSTRAINT `audit_events_team_id_sequence_pk` PRIMARY KEY(`team_id`,`sequence`)
);
--> statement-breakpoint
CREATE TABLE `audit_heads` (
	`team_id` bigint unsigned NOT NULL,
	`last_sequence` bigint unsigned NOT NULL DEFAULT 0,
	`last_mac` varchar(64) CHARACTER SET utf8mb4 COLLATE utf8mb4_bin NOT NULL DEFAULT '',
	CONSTRAINT `audit_heads_team_id` PRIMARY KEY(`team_id`)
);
--> statement-breakpoint
CREATE TABLE `idempotency_keys` (
	`user_id` bigint unsigned NOT NULL,
	`key` varchar(100) CHARACTER SET utf8mb4 COLLATE utf8mb4_bin NOT NULL,
	`request_hash` varchar(64) CHARACTER SET utf8mb4 COLLATE utf8mb4_bin NOT NULL,
	`status` smallint unsigned,
	`headers` json,
	`body` json,
	`created_at` datetime(3) NOT NULL DEFAULT CURRENT_TIMESTAMP(3),
	CONSTRAINT `idempotency_keys_user_id_key_pk` PRIMARY KEY(`user_id`,`key`)
);
--> statement-breakpoint
CREATE TABLE `revisions` (
	`id` bigint unsigned AUTO_INCREMENT NOT NULL,
	`team_id` bigint unsigned NOT NULL,
	`table_id` bigint unsigned NOT NULL,
	`number` int unsigned NOT NULL,
	`state` enum('draft','in-review','vetted','returned','withdrawn') NOT NULL DEFAULT 'draft',
	`bits` tinyint unsigned NOT NULL,
	`length` int unsigned NOT NULL,
	`snr_db` double,
	`table_bytes` int unsigned NOT NULL,
	`definition` json NOT NULL,
	`playback` json,
	`report` json NOT NULL,
	`warnings` json NOT NULL,
	`codes` mediumblob NOT NULL,
	`engine_version` varchar(20) CHARACTER SET utf8mb4 COLLATE utf8mb4_bin NOT NULL,
	`digest` varchar(64) CHARACTER SET utf8mb4 COLLATE utf8mb4_bin NOT NULL,
	`note` varchar(2000) NOT NULL DEFAULT '',
	`made_by` bigint unsigned,
	`created_at` datetime(3) NOT NULL DEFAULT CURRENT_TIMESTAMP(3),
	CONSTRAINT `revisions_id` PRIMARY KEY(`id`),
	CONSTRAINT `revisions_number` UNIQUE(`team_id`,`table_id`,`number`),
	CONSTRAINT `revisions_team_id` UNIQUE(`team_id`,`id`)
);
--> statement-breakpoint
CREATE TABLE `table_terms` (
	`team_id` bigint unsigned NOT NULL,
	`table_id` bigint unsigned NOT NULL,
	`is_archived` boolean NOT NULL DEFAULT false,
	`term` varchar(64) CHARACTER SET utf8mb4 COLLATE utf8mb4_bin NOT NULL,
	CONSTRAINT `table_terms_team_id_is_archived_term_table_id_pk` PRIMARY KEY(`team_id`,`is_archived`,`term`,`table_id`),
	CONSTRAINT `table_terms_table` UNIQUE(`team_id`,`table_id`,`term`)
);
--> statement-breakpoint
CREATE TABLE `wave_tables` (
	`id` bigint unsigned AUTO_INCREMENT NOT NULL,
	`team_id` bigint unsigned NOT NULL,
	`slug` varchar(70) CHARACTER SET utf8mb4 COLLATE utf8mb4_bin NOT NULL,
	`title` varchar(64) NOT NULL,
	`tags` json NOT NULL,
	`signature_low` bigint unsigned NOT NULL,
	`signature_high` bigint unsigned NOT NULL,
	`is_archived` boolean NOT NULL DEFAULT false,
	`version` int unsigned NOT NULL DEFAULT 1,
	`latest_revision` int unsigned NOT NULL,
	`state` enum('draft','in-review','vetted','returned','withdrawn') NOT NULL DEFAULT 'draft',
	`bits` tinyint unsigned NOT NULL,
	`length` int unsigned NOT NULL,
	`snr_db` double,
	`table_bytes` int unsigned NOT NULL,
	`drawing` varbinary(128) NOT NULL,
	`created_by` bigint unsigned,
	`created_at` datetime(3) NOT NULL DEFAULT CURRENT_TIMESTAMP(3),
	`changed_by` bigint unsigned,
	`changed_at` datetime(3) NOT NULL,
	CONSTRAINT `wave_tables_id` PRIMARY KEY(`id`),
	CONSTRAINT `wave_tables_slug` UNIQUE(`team_id`,`slug`),
	CONSTRAINT `wave_tables_team_id` UNIQUE(`team_id`,`id`)
);
--> statement-breakpoint
CREATE TABLE `mail_outbox` (
	`id` bigint unsigned AUTO_INCREMENT NOT NULL,
	`message_id` varchar(300) CHARACTER SET utf8mb4 COLLATE utf8mb4_bin NOT NULL,
	`recipient` varchar(254) CHARACTER SET utf8mb4 COLLATE utf8mb4_bin NOT NULL,
	`subject` varchar(200) NOT NULL,
	`text_body` text,
	`html_body` text,
	`state` enum('waiting','sent','undelivered') NOT NULL DEFAULT 'waiting',
	`failures` tinyint unsigned NOT NULL DEFAULT 0,
	`last_error` varchar(500),
	`due_at` datetime(3) NOT NULL,
	`claimed_until` datetime(3),
	`created_at` datetime(3) NOT NULL DEFAULT CURRENT_TIMESTAMP(3),
	`sent_at` datetime(3),
	CONSTRAINT `mail_outbox_id` PRIMARY KEY(`id`),
	CONSTRAINT `mail_outbox_message_id_unique` UNIQUE(`message_id`)
);
--> statement-breakpoint
CREATE TABLE `mailbox_messages` (
	`id` bigint unsigned AUTO_INCREMENT NOT NULL,
	`message_id` varchar(300) CHARACTER SET utf8mb4 COLLATE utf8mb4_bin NOT NULL,
	`recipient` varchar(254) CHARACTER SET utf8mb4 COLLATE utf8mb4_bin NOT NULL,
	`sender` varchar(300) NOT NULL,
	`subject` varchar(300) NOT NULL,
	`text_body` mediumtext NOT NULL,
	`html_body` mediumtext NOT NULL,
	`received_at` datetime(3) NOT NULL,
	CONSTRAINT `mailbox_messages_id` PRIMARY KEY(`id`),
	CONSTRAINT `mailbox_messages_message_id_unique` UNIQUE(`message_id`)
);
--> statement-breakpoint
CREATE TABLE `rate_limits` (
	`key` varchar(255) CHARACTER SET utf8mb4 COLLATE utf8mb4_bin NOT NULL,
	`points` int NOT NULL DEFAULT 0,
	`expire` bigint unsigned,
	CONSTRAINT `rate_limits_key` PRIMARY KEY(`key`)
);
--> statement-breakpoint
CREATE TABLE `one_time_links` (
	`id` bigint unsigned AUTO_INCREMENT NOT NULL,
	`token_hash` varchar(64) CHARACTER SET utf8mb4 COLLATE utf8mb4_bin NOT NULL,
	`purpose` enum('verify-address','reset-password','change-address','invitation') NOT NULL,
	`email` varchar(254) CHARACTER SET utf8mb4 COLLATE utf8mb4_bin NOT NULL,
	`user_id` bigint unsigned,
	`team_id` bigint unsigned,
	`role` enum('viewer','author','reviewer','admin'),
	`mail_id` bigint unsigned,
	`created_by` bigint unsigned,
	`created_at` datetime(3) NOT NULL DEFAULT CURRENT_TIMESTAMP(3),
	`expires_at` datetime(3) NOT NULL,
	`used_at` datetime(3),
	CONSTRAINT `one_time_links_id` PRIMARY KEY(`id`),
	CONSTRAINT `one_time_links_token_hash_unique` UNIQUE(`token_hash`)
);
--> statement-breakpoint
CREATE TABLE `sessions` (
	`id` varchar(22) CHARACTER SET utf8mb4 COLLATE utf8mb4_bin NOT NULL,
	`user_id` bigint unsigned NOT NULL,
	`session_version` int unsigned NOT NULL,
	`client` varchar(200) NOT NULL,
	`created_at` datetime(3) NOT NULL DEFAULT CURRENT_TIMESTAMP(3),
	`last_seen_at` datetime(3) NOT NULL,
	`expires_at` datetime(3) NOT NULL,
	`revoked_at` datetime(3),
	CONSTRAINT `sessions_id` PRIMARY KEY(`id`)
);
--> statement-breakpoint
CREATE TABLE `memberships` (
	`team_id` bigint unsigned NOT NULL,
	`user_id` bigint unsigned NOT NULL,
	`role` enum('viewer','author','reviewer','admin') NOT NULL,
	`created_at` datetime(3) NOT NULL DEFAULT CURRENT_TIMESTAMP(3),
	CONSTRAINT `memberships_team_id_user_id_pk` PRIMARY KEY(`team_id`,`user_id`)
);
--> statement-breakpoint
CREATE TABLE `teams` (
	`id` bigint unsigned AUTO_INCREMENT NOT NULL,
	`slug` varchar(60) CHARACTER SET utf8mb4 COLLATE utf8mb4_bin NOT NULL,
	`name` varchar(100) NOT NULL,
	`defaults` json NOT NULL,
	`version` int unsigned NOT NULL DEFAULT 1,
	`created_at` datetime(3) NOT NULL DEFAULT CURRENT_TIMESTAMP(3),
	CONSTRAINT `teams_id` PRIMARY KEY(`id`),
	CONSTRAINT `teams_slug_unique` UNIQUE(`slug`)
);
--> statement-breakpoint
CREATE TABLE `users` (
	`id` bigint unsigned AUTO_INCREMENT NOT NULL,
	`email` varchar(254) CHARACTER SET utf8mb4 COLLATE utf8mb4_bin NOT NULL,
	`name` varchar(100) NOT NULL,
	`password_hash` varchar(255),
	`email_verified_at` datetime(3),
	`session_version` int unsigned NOT NULL DEFAULT 1,
	`created_at` datetime(3) NOT NULL DEFAULT CURRENT_TIMESTAMP(3),
	CONSTRAINT `users_id` PRIMARY KEY(`id`),
	CONSTRAINT `users_email_unique` UNIQUE(`email`)
);
--> statement-breakpoint
ALTER TABLE `audit_events` ADD CONSTRAINT `audit_events_team_id_teams_id_fk` FOREIGN KEY (`team_id`) REFERENCES `teams`(`id`) ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE `audit_heads` ADD CONSTRAINT `audit_heads_team_id_teams_id_fk` FOREIGN KEY (`team_id`) REFERENCES `teams`(`id`) ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE `idempotency_keys` ADD CONSTRAINT `idempotency_keys_user_id_users_id_fk` FOREIGN KEY (`user_id`) REFERENCES `users`(`id`) ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE `revisions` ADD CONSTRAINT `revisions_made_by_users_id_fk` FOREIGN KEY (`made_by`) REFERENCES `users`(`id`) ON DELETE set null ON UPDATE no action;--> statement-breakpoint
ALTER TABLE `revisions` ADD CONSTRAINT `revisions_table_fk` FOREIGN KEY (`team_id`,`table_id`) REFERENCES `wave_tables`(`team_id`,`id`) ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE `table_terms` ADD CONSTRAINT `table_terms_table_fk` FOREIGN KEY (`team_id`,`table_id`) REFERENCES `wave_tables`(`team_id`,`id`) ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE `wave_tables` ADD CONSTRAINT `wave_tables_team_id_teams_id_fk` FOREIGN KEY (`team_id`) REFERENCES `teams`(`id`) ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE `wave_tables` ADD CONSTRAINT `wave_tables_created_by_users_id_fk` FOREIGN KEY (`created_by`) REFERENCES `users`(`id`) ON DELETE set null ON UPDATE no action;--> statement-breakpoint
ALTER TABLE `wave_tables` ADD CONSTRAINT `wave_tables_changed_by_users_id_fk` FOREIGN KEY (`changed_by`) REFERENCES `users`(`id`) ON DELETE set null ON UPDATE no action;--> statement-breakpoint
ALTER TABLE `one_time_links` ADD CONSTRAINT `one_time_links_user_id_users_id_fk` FOREIGN KEY (`user_id`) REFERENCES `users`(`id`) ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE `one_time_links` ADD CONSTRAINT `one_time_links_team_id_teams_id_fk` FOREIGN KEY (`team_id`) REFERENCES `teams`(`id`) ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE `one_time_links` ADD CONSTRAINT `one_time_links_mail_id_mail_outbox_id_fk` FOREIGN KEY (`mail_id`) REFERENCES `mail_outbox`(`id`) ON DELETE set null ON UPDATE no action;--> statement-breakpoint
ALTER TABLE `one_time_links` ADD CONSTRAINT `one_time_links_created_by_users_id_fk` FOREIGN KEY (`created_by`) REFERENCES `users`(`id`) ON DELETE set null ON UPDATE no action;--> statement-breakpoint
ALTER TABLE `sessions` ADD CONSTRAINT `sessions_user_id_users_id_fk` FOREIGN KEY (`user_id`) REFERENCES `users`(`id`) ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE `memberships` ADD CONSTRAINT `memberships_team_id_teams_id_fk` FOREIGN KEY (`team_id`) REFERENCES `teams`(`id`) ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE `memberships` ADD CONSTRAINT `memberships_user_id_users_id_fk` FOREIGN KEY (`user_id`) REFERENCES `users`(`id`) ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
CREATE INDEX `audit_events_subject` ON `audit_events` (`team_id`,`subject`,`sequence`);--> statement-breakpoint
CREATE INDEX `idempotency_keys_age` ON `idempotency_keys` (`created_at`);--> statement-breakpoint
CREATE INDEX `revisions_digest` ON `revisions` (`team_id`,`digest`);--> statement-breakpoint
CREATE INDEX `wave_tables_state` ON `wave_tables` (`team_id`,`is_archived`,`state`,`id`);--> statement-breakpoint
CREATE INDEX `wave_tables_changed` ON `wave_tables` (`team_id`,`is_archived`,`changed_at`,`id`,`state`,`signature_low`,`signature_high`);--> statement-breakpoint
CREATE INDEX `wave_tables_title` ON `wave_tables` (`team_id`,`is_archived`,`title`,`id`,`state`,`signature_low`,`signature_high`);--> statement-breakpoint
CREATE INDEX `wave_tables_snr` ON `wave_tables` (`team_id`,`is_archived`,`snr_db`,`id`,`state`,`signature_low`,`signature_high`);--> statement-breakpoint
CREATE INDEX `wave_tables_bytes` ON `wave_tables` (`team_id`,`is_archived`,`table_bytes`,`id`,`state`,`signature_low`,`signature_high`);--> statement-breakpoint
CREATE INDEX `wave_tables_length` ON `wave_tables` (`team_id`,`is_archived`,`length`,`id`,`state`,`signature_low`,`signature_high`);--> statement-breakpoint
CREATE INDEX `wave_tables_bits` ON `wave_tables` (`team_id`,`is_archived`,`bits`,`id`,`state`,`signature_low`,`signature_high`);--> statement-breakpoint
CREATE INDEX `mail_outbox_due` ON `mail_outbox` (`state`,`due_at`);--> statement-breakpoint
CREATE INDEX `rate_limits_expire` ON `rate_limits` (`expire`);--> statement-breakpoint
CREATE INDEX `one_time_links_user` ON `one_time_links` (`user_id`,`purpose`);--> statement-breakpoint
CREATE INDEX `one_time_links_team` ON `one_time_links` (`team_id`,`purpose`);--> statement-breakpoint
CREATE INDEX `one_time_links_expiry` ON `one_time_links` (`expires_at`);--> statement-breakpoint
CREATE INDEX `sessions_user` ON `sessions` (`user_id`);--> statement-breakpoint
CREATE INDEX `sessions_expiry` ON `sessions` (`expires_at`);--> statement-breakpoint
CREATE INDEX `memberships_user` ON `memberships` (`user_id`);