CREATE TABLE `members` (
	`id` text PRIMARY KEY NOT NULL,
	`project_id` text NOT NULL,
	`mark` text NOT NULL,
	`title` text NOT NULL,
	`state` text NOT NULL,
	`revision` text NOT NULL,
	`document` text NOT NULL,
	`version` integer NOT NULL,
	`result` text,
	`refusal` text,
	`engine` text NOT NULL,
	`outcome` text NOT NULL,
	`utilisation` real,
	`saved_at` integer NOT NULL,
	`saved_by` text,
	FOREIGN KEY (`project_id`) REFERENCES `projects`(`id`) ON UPDATE no action ON DELETE cascade,
	FOREIGN KEY (`saved_by`) REFERENCES `people`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE UNIQUE INDEX `members_mark` ON `members` (`project_id`,`mark`);--> statement-breakpoint
CREATE TABLE `people` (
	`id` text PRIMARY KEY NOT NULL,
	`email` text NOT NULL,
	`name` text NOT NULL,
	`role` text NOT NULL,
	`active` integer NOT NULL,
	`password_hash` text NOT NULL,
	`units` text NOT NULL,
	`theme` text NOT NULL,
	`wrong_tries` integer DEFAULT 0 NOT NULL,
	`paused_until` integer,
	`created_at` integer NOT NULL
);
--> statement-breakpoint
CREATE UNIQUE INDEX `people_email` ON `people` (`email`);--> statement-breakpoint
CREATE TABLE `projects` (
	`id` text PRIMARY KEY NOT NULL,
	`number` text NOT NULL,
	`name` text NOT NULL,
	`client` text NOT NULL,
	`site_address` text NOT NULL,
	`archived` integer DEFAULT false NOT NULL,
	`designer_id` text,
	`checker_id` text,
	`due` text,
	`created_at` integer NOT NULL,
	FOREIGN KEY (`designer_id`) REFERENCES `people`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`checker_id`) REFERENCES `people`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE UNIQUE INDEX `projects_number` ON `projects` (`number`);--> statement-breakpoint
CREATE TABLE `sessions` (
	`id` text PRIMARY KEY NOT NULL,
	`user_id` text NOT NULL,
	`expires_at` integer NOT NULL,
	`started_at` integer NOT NULL,
	`used_at` integer NOT NULL,
	FOREIGN KEY (`user_id`) REFERENCES `people`(`id`) ON UPDATE no action ON DELETE cascade
);
--> statement-breakpoint
CREATE INDEX `sessions_user` ON `sessions` (`user_id`);