ALTER TABLE `audit_events` DROP FOREIGN KEY `audit_events_team_id_teams_id_fk`;
--> statement-breakpoint
ALTER TABLE `audit_events` ADD CONSTRAINT `audit_events_team_id_audit_heads_team_id_fk` FOREIGN KEY (`team_id`) REFERENCES `audit_heads`(`team_id`) ON DELETE cascade ON UPDATE no action;