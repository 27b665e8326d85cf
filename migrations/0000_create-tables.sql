CREATE TABLE `audit_entry` (
	`chain` char(36) character set ascii collate ascii_nopad_bin NOT NULL,
	`seq` bigint NOT NULL,
	`at` datetime(6) NOT NULL,
	`actor_id` char(36) character set ascii collate ascii_nopad_bin NOT NULL,
	`kind` varchar(60) NOT NULL,
	`payload` longtext character set utf8mb4 collate utf8mb4_nopad_bin NOT NULL,
	`payload_hash` binary(32) NOT NULL,
	`prev_hash` binary(32) NOT NULL,
	`hash` binary(32) NOT NULL,
	CONSTRAINT `audit_entry_chain_seq_pk` PRIMARY KEY(`chain`,`seq`)
);
--> statement-breakpoint
CREATE TABLE `audit_head` (
	`chain` char(36) character set ascii collate ascii_nopad_bin NOT NULL,
	`seq` bigint NOT NULL,
	`hash` binary(32) NOT NULL,
	CONSTRAINT `audit_head_chain` PRIMARY KEY(`chain`)
);
--> statement-breakpoint
CREATE TABLE `files` (
	`id` char(36) character set ascii collate ascii_nopad_bin NOT NULL,
	`study_id` char(36) character set ascii collate ascii_nopad_bin NOT NULL,
	`name` varchar(200) NOT NULL,
	`sha256` char(64) NOT NULL,
	`bytes` int NOT NULL,
	`content` longblob NOT NULL,
	`uploaded_by` char(36) character set ascii collate ascii_nopad_bin NOT NULL,
	`uploaded_at` datetime(3) NOT NULL,
	CONSTRAINT `files_id` PRIMARY KEY(`id`)
);
--> statement-breakpoint
CREATE TABLE `test_readings` (
	`study_id` char(36) character set ascii collate ascii_nopad_bin NOT NULL,
	`test_id` char(36) character set ascii collate ascii_nopad_bin NOT NULL,
	`mapping` longtext NOT NULL,
	`readings` longtext NOT NULL,
	CONSTRAINT `test_readings_study_id_test_id_pk` PRIMARY KEY(`study_id`,`test_id`)
);
--> statement-breakpoint
CREATE TABLE `outbox` (
	`id` char(36) character set ascii collate ascii_nopad_bin NOT NULL,
	`kind` varchar(60) NOT NULL,
	`recipient_id` char(36) character set ascii collate ascii_nopad_bin NOT NULL,
	`payload` longtext NOT NULL,
	`created_at` datetime(3) NOT NULL,
	`due_at` datetime(3),
	`attempts` int NOT NULL,
	`sent_at` datetime(3),
	`last_error` text,
	CONSTRAINT `outbox_id` PRIMARY KEY(`id`)
);
--> statement-breakpoint
CREATE TABLE `one_time_links` (
	`token_hash` char(64) NOT NULL,
	`person_id` char(36) character set ascii collate ascii_nopad_bin,
	`purpose` varchar(20) NOT NULL,
	`expires_at` datetime(3) NOT NULL,
	`used_at` datetime(3),
	CONSTRAINT `one_time_links_token_hash` PRIMARY KEY(`token_hash`)
);
--> statement-breakpoint
CREATE TABLE `people` (
	`id` char(36) character set ascii collate ascii_nopad_bin NOT NULL,
	`email` varchar(254) character set utf8mb4 collate utf8mb4_nopad_bin NOT NULL,
	`name` varchar(120) NOT NULL,
	`password_hash` varchar(255),
	`is_administrator` boolean NOT NULL,
	`is_auditor` boolean NOT NULL,
	`is_active` boolean NOT NULL,
	`created_at` datetime(3) NOT NULL,
	CONSTRAINT `people_id` PRIMARY KEY(`id`),
	CONSTRAINT `people_email_unique` UNIQUE(`email`)
);
--> statement-breakpoint
CREATE TABLE `sessions` (
	`id_hash` char(64) NOT NULL,
	`person_id` char(36) character set ascii collate ascii_nopad_bin,
	`data` varchar(4000) NOT NULL,
	`expires_at` datetime(3) NOT NULL,
	CONSTRAINT `sessions_id_hash` PRIMARY KEY(`id_hash`)
);
--> statement-breakpoint
CREATE TABLE `chain_items` (
	`study_id` char(36) character set ascii collate ascii_nopad_bin NOT NULL,
	`id` char(36) character set ascii collate ascii_nopad_bin NOT NULL,
	`kind` varchar(20) NOT NULL,
	`position` int NOT NULL,
	`revision` int NOT NULL,
	`body` longtext NOT NULL,
	`last_edited_by` char(36) character set ascii collate ascii_nopad_bin NOT NULL,
	CONSTRAINT `chain_items_study_id_id_pk` PRIMARY KEY(`study_id`,`id`)
);
--> statement-breakpoint
CREATE TABLE `layouts` (
	`study_id` char(36) character set ascii collate ascii_nopad_bin NOT NULL,
	`positions` longtext NOT NULL,
	CONSTRAINT `layouts_study_id` PRIMARY KEY(`study_id`)
);
--> statement-breakpoint
CREATE TABLE `memberships` (
	`study_id` char(36) character set ascii collate ascii_nopad_bin NOT NULL,
	`person_id` char(36) character set ascii collate ascii_nopad_bin NOT NULL,
	`role` varchar(20) NOT NULL,
	CONSTRAINT `memberships_study_id_person_id_pk` PRIMARY KEY(`study_id`,`person_id`)
);
--> statement-breakpoint
CREATE TABLE `route_states` (
	`study_id` char(36) character set ascii collate ascii_nopad_bin NOT NULL,
	`route_id` char(36) character set ascii collate ascii_nopad_bin NOT NULL,
	`status` varchar(20) NOT NULL,
	`revision` int NOT NULL,
	`submission_id` char(36) character set ascii collate ascii_nopad_bin,
	`signed_basis_hash` char(64),
	CONSTRAINT `route_states_study_id_route_id_pk` PRIMARY KEY(`study_id`,`route_id`)
);
--> statement-breakpoint
CREATE TABLE `studies` (
	`id` char(36) character set ascii collate ascii_nopad_bin NOT NULL,
	`title` varchar(200) NOT NULL,
	`question` text NOT NULL,
	`revision` int NOT NULL,
	`created_at` datetime(3) NOT NULL,
	`changed_at` datetime(3) NOT NULL,
	CONSTRAINT `studies_id` PRIMARY KEY(`id`)
);
--> statement-breakpoint
CREATE TABLE `rulings` (
	`submission_id` char(36) character set ascii collate ascii_nopad_bin NOT NULL,
	`route_id` char(36) character set ascii collate ascii_nopad_bin NOT NULL,
	`assumption_key` varchar(80) NOT NULL,
	`ruling` longtext NOT NULL,
	`by_person` char(36) character set ascii collate ascii_nopad_bin NOT NULL,
	`at` datetime(3) NOT NULL,
	CONSTRAINT `rulings_submission_id_route_id_assumption_key_pk` PRIMARY KEY(`submission_id`,`route_id`,`assumption_key`)
);
--> statement-breakpoint
CREATE TABLE `signatures` (
	`submission_id` char(36) character set ascii collate ascii_nopad_bin NOT NULL,
	`signer_id` char(36) character set ascii collate ascii_nopad_bin NOT NULL,
	`signer_name` varchar(120) NOT NULL,
	`meaning` varchar(300) NOT NULL,
	`snapshot_hash` char(64) NOT NULL,
	`signed_at` datetime(3) NOT NULL,
	CONSTRAINT `signatures_submission_id_signer_id_pk` PRIMARY KEY(`submission_id`,`signer_id`)
);
--> statement-breakpoint
CREATE TABLE `submission_authors` (
	`submission_id` char(36) character set ascii collate ascii_nopad_bin NOT NULL,
	`person_id` char(36) character set ascii collate ascii_nopad_bin NOT NULL,
	CONSTRAINT `submission_authors_submission_id_person_id_pk` PRIMARY KEY(`submission_id`,`person_id`)
);
--> statement-breakpoint
CREATE TABLE `submission_routes` (
	`submission_id` char(36) character set ascii collate ascii_nopad_bin NOT NULL,
	`route_id` char(36) character set ascii collate ascii_nopad_bin NOT NULL,
	CONSTRAINT `submission_routes_submission_id_route_id_pk` PRIMARY KEY(`submission_id`,`route_id`)
);
--> statement-breakpoint
CREATE TABLE `submissions` (
	`id` char(36) character set ascii collate ascii_nopad_bin NOT NULL,
	`study_id` char(36) character set ascii collate ascii_nopad_bin NOT NULL,
	`target_quantity_id` char(36) character set ascii collate ascii_nopad_bin NOT NULL,
	`target_name` varchar(200) NOT NULL,
	`status` varchar(20) NOT NULL,
	`note` text NOT NULL,
	`submitted_by` char(36) character set ascii collate ascii_nopad_bin NOT NULL,
	`submitted_at` datetime(3) NOT NULL,
	`snapshot` longtext NOT NULL,
	`snapshot_hash` char(64) NOT NULL,
	`outcome_by` char(36) character set ascii collate ascii_nopad_bin,
	`outcome_at` datetime(3),
	`outcome_comments` text,
	CONSTRAINT `submissions_id` PRIMARY KEY(`id`)
);
--> statement-breakpoint
CREATE INDEX `outbox_due` ON `outbox` (`due_at`);--> statement-breakpoint
CREATE INDEX `sessions_by_person` ON `sessions` (`person_id`);--> statement-breakpoint
CREATE INDEX `sessions_by_expiry` ON `sessions` (`expires_at`);--> statement-breakpoint
CREATE INDEX `memberships_by_person` ON `memberships` (`person_id`);--> statement-breakpoint
CREATE INDEX `submissions_by_study` ON `submissions` (`study_id`,`status`);