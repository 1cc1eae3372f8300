CREATE TABLE `catalog_versions` (
	`team_id` int unsigned NOT NULL,
	`version` int unsigned NOT NULL,
	CONSTRAINT `catalog_versions_team_id` PRIMARY KEY(`team_id`)
);
