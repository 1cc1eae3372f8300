CREATE TABLE `brief_versions` (
	`brief_id` int unsigned NOT NULL,
	`version` int unsigned NOT NULL,
	`name` varchar(120) NOT NULL,
	`brief` json NOT NULL,
	`saved_by` varchar(255) NOT NULL,
	`saved_at` datetime(3) NOT NULL,
	CONSTRAINT `brief_versions_brief_id_version_pk` PRIMARY KEY(`brief_id`,`version`)
);
--> statement-breakpoint
CREATE TABLE `briefs` (
	`id` int unsigned AUTO_INCREMENT NOT NULL,
	`team_id` int unsigned NOT NULL,
	`name` varchar(120) NOT NULL,
	`version` int unsigned NOT NULL,
	`brief` json NOT NULL,
	`created_by` varchar(255) NOT NULL,
	`updated_by` varchar(255) NOT NULL,
	`created_at` datetime(3) NOT NULL,
	`updated_at` datetime(3) NOT NULL,
	`deleted_at` datetime(3),
	CONSTRAINT `briefs_id` PRIMARY KEY(`id`)
);
--> statement-breakpoint
CREATE TABLE `users` (
	`id` varchar(255) NOT NULL,
	`email` varchar(254) NOT NULL,
	`name` varchar(120) NOT NULL,
	`password_hash` varchar(255) NOT NULL,
	`created_at` datetime(3) NOT NULL,
	CONSTRAINT `users_id` PRIMARY KEY(`id`),
	CONSTRAINT `users_email_unique` UNIQUE(`email`)
);
--> statement-breakpoint
CREATE TABLE `capacitor_orderables` (
	`id` int unsigned AUTO_INCREMENT NOT NULL,
	`orderable_number` varchar(60) NOT NULL,
	`maker` varchar(120) NOT NULL,
	`tolerance` double NOT NULL,
	`size` varchar(40) NOT NULL,
	`voltage_rating` double NOT NULL,
	`stock` int NOT NULL,
	`lead_time_weeks` int NOT NULL,
	`price_breaks` json NOT NULL,
	`family` enum('C0G','X7R','film','electrolytic') NOT NULL,
	`farads` double NOT NULL,
	`polarised` boolean NOT NULL,
	CONSTRAINT `capacitor_orderables_id` PRIMARY KEY(`id`),
	CONSTRAINT `resistor_orderables_orderable_number_unique` UNIQUE(`orderable_number`)
);
--> statement-breakpoint
CREATE TABLE `resistor_orderables` (
	`id` int unsigned AUTO_INCREMENT NOT NULL,
	`orderable_number` varchar(60) NOT NULL,
	`maker` varchar(120) NOT NULL,
	`tolerance` double NOT NULL,
	`size` varchar(40) NOT NULL,
	`voltage_rating` double NOT NULL,
	`stock` int NOT NULL,
	`lead_time_weeks` int NOT NULL,
	`price_breaks` json NOT NULL,
	`family` enum('thick film','thin film','metal film') NOT NULL,
	`series` enum('E24','E96') NOT NULL,
	`ohms` double NOT NULL,
	`power_rating` double NOT NULL,
	`ppm_per_kelvin` double NOT NULL,
	CONSTRAINT `resistor_orderables_id` PRIMARY KEY(`id`),
	CONSTRAINT `resistor_orderables_orderable_number_unique` UNIQUE(`orderable_number`)
);
--> statement-breakpoint
CREATE TABLE `parts` (
	`id` int unsigned AUTO_INCREMENT NOT NULL,
	`team_id` int unsigned,
	`part_number` varchar(60) NOT NULL,
	`maker` varchar(120) NOT NULL,
	`polarity` enum('n','p') NOT NULL,
	`package` varchar(40) NOT NULL,
	`mounting` enum('surface','through-hole') NOT NULL,
	`vt_min` double NOT NULL,
	`vt_typ` double NOT NULL,
	`vt_max` double NOT NULL,
	`k_min` double NOT NULL,
	`k_typ` double NOT NULL,
	`k_max` double NOT NULL,
	`lambda` double NOT NULL,
	`tc_vt` double NOT NULL,
	`ciss` double NOT NULL,
	`coss` double NOT NULL,
	`crss` double NOT NULL,
	`vdss` double NOT NULL,
	`vgss` double NOT NULL,
	`id_max` double NOT NULL,
	`pd25` double NOT NULL,
	`rth_ja` double NOT NULL,
	`tj_max` double NOT NULL,
	`lifecycle` enum('active','not-recommended','last-time-buy','obsolete') NOT NULL,
	`stock` int NOT NULL,
	`lead_time_weeks` int NOT NULL,
	`price_breaks` json NOT NULL,
	CONSTRAINT `parts_id` PRIMARY KEY(`id`),
	CONSTRAINT `parts_by_team_and_number` UNIQUE(`team_id`,`maker`,`part_number`)
);
--> statement-breakpoint
CREATE TABLE `sessions` (
	`id` varchar(255) NOT NULL,
	`user_id` varchar(255) NOT NULL,
	`expires_at` datetime(3) NOT NULL,
	`team_id` int unsigned NOT NULL,
	`signed_in_at` datetime(3) NOT NULL,
	CONSTRAINT `sessions_id` PRIMARY KEY(`id`)
);
--> statement-breakpoint
CREATE TABLE `stages` (
	`id` int unsigned AUTO_INCREMENT NOT NULL,
	`team_id` int unsigned NOT NULL,
	`name` varchar(120) NOT NULL,
	`note` text NOT NULL,
	`version` int unsigned NOT NULL,
	`part` json NOT NULL,
	`resistors` json NOT NULL,
	`brief` json NOT NULL,
	`brief_id` int unsigned,
	`brief_name` varchar(120),
	`brief_version` int unsigned,
	`created_by` varchar(255) NOT NULL,
	`updated_by` varchar(255) NOT NULL,
	`created_at` datetime(3) NOT NULL,
	`updated_at` datetime(3) NOT NULL,
	`deleted_at` datetime(3),
	CONSTRAINT `stages_id` PRIMARY KEY(`id`)
);
--> statement-breakpoint
CREATE TABLE `membership_roles` (
	`team_id` int unsigned NOT NULL,
	`user_id` varchar(255) NOT NULL,
	`role` enum('owner','designer','reviewer','librarian','buyer','viewer') NOT NULL,
	CONSTRAINT `membership_roles_team_id_user_id_role_pk` PRIMARY KEY(`team_id`,`user_id`,`role`)
);
--> statement-breakpoint
CREATE TABLE `memberships` (
	`team_id` int unsigned NOT NULL,
	`user_id` varchar(255) NOT NULL,
	`created_at` datetime(3) NOT NULL,
	CONSTRAINT `memberships_team_id_user_id_pk` PRIMARY KEY(`team_id`,`user_id`)
);
--> statement-breakpoint
CREATE TABLE `teams` (
	`id` int unsigned AUTO_INCREMENT NOT NULL,
	`name` varchar(120) NOT NULL,
	`created_at` datetime(3) NOT NULL,
	CONSTRAINT `teams_id` PRIMARY KEY(`id`)
);
--> statement-breakpoint
ALTER TABLE `brief_versions` ADD CONSTRAINT `brief_versions_brief_id_briefs_id_fk` FOREIGN KEY (`brief_id`) REFERENCES `briefs`(`id`) ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE `brief_versions` ADD CONSTRAINT `brief_versions_saved_by_users_id_fk` FOREIGN KEY (`saved_by`) REFERENCES `users`(`id`) ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE `briefs` ADD CONSTRAINT `briefs_team_id_teams_id_fk` FOREIGN KEY (`team_id`) REFERENCES `teams`(`id`) ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE `briefs` ADD CONSTRAINT `briefs_created_by_users_id_fk` FOREIGN KEY (`created_by`) REFERENCES `users`(`id`) ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE `briefs` ADD CONSTRAINT `briefs_updated_by_users_id_fk` FOREIGN KEY (`updated_by`) REFERENCES `users`(`id`) ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE `parts` ADD CONSTRAINT `parts_team_id_teams_id_fk` FOREIGN KEY (`team_id`) REFERENCES `teams`(`id`) ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE `sessions` ADD CONSTRAINT `sessions_user_id_users_id_fk` FOREIGN KEY (`user_id`) REFERENCES `users`(`id`) ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE `sessions` ADD CONSTRAINT `sessions_team_id_teams_id_fk` FOREIGN KEY (`team_id`) REFERENCES `teams`(`id`) ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE `stages` ADD CONSTRAINT `stages_team_id_teams_id_fk` FOREIGN KEY (`team_id`) REFERENCES `teams`(`id`) ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE `stages` ADD CONSTRAINT `stages_brief_id_briefs_id_fk` FOREIGN KEY (`brief_id`) REFERENCES `briefs`(`id`) ON DELETE set null ON UPDATE no action;--> statement-breakpoint
ALTER TABLE `stages` ADD CONSTRAINT `stages_created_by_users_id_fk` FOREIGN KEY (`created_by`) REFERENCES `users`(`id`) ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE `stages` ADD CONSTRAINT `stages_updated_by_users_id_fk` FOREIGN KEY (`updated_by`) REFERENCES `users`(`id`) ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE `membership_roles` ADD CONSTRAINT `membership_roles_of_membership` FOREIGN KEY (`team_id`,`user_id`) REFERENCES `memberships`(`team_id`,`user_id`) ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE `memberships` ADD CONSTRAINT `memberships_team_id_teams_id_fk` FOREIGN KEY (`team_id`) REFERENCES `teams`(`id`) ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE `memberships` ADD CONSTRAINT `memberships_user_id_users_id_fk` FOREIGN KEY (`user_id`) REFERENCES `users`(`id`) ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
CREATE INDEX `briefs_by_team` ON `briefs` (`team_id`,`updated_at`);--> statement-breakpoint
CREATE INDEX `resistors_by_tolerance` ON `resistor_orderables` (`tolerance`,`ohms`);--> statement-breakpoint
CREATE INDEX `parts_by_number` ON `parts` (`part_number`,`id`);--> statement-breakpoint
CREATE INDEX `stages_by_team` ON `stages` (`team_id`,`updated_at`);