CREATE INDEX `audit_events_actor` ON `audit_events` (`team_id`,`actor_id`,`sequence`,`action`,`at`);--> statement-breakpoint
CREATE INDEX `audit_events_action` ON `audit_events` (`team_id`,`action`,`sequence`,`actor_id`,`at`);--> statement-breakpoint
CREATE INDEX `audit_events_moment` ON `audit_events` (`team_id`,`at`,`sequence`,`actor_id`,`action`);