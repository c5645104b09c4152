CREATE TABLE `drift_bases` (
	`id` integer PRIMARY KEY NOT NULL,
	`supplier_id` integer NOT NULL,
	`part_id` integer NOT NULL,
	`key` text NOT NULL,
	`version` integer NOT NULL,
	`from_date` text NOT NULL,
	`to_date` text NOT NULL,
	`reason` text NOT NULL,
	`frozen_by_id` integer NOT NULL,
	`frozen_at` text NOT NULL,
	FOREIGN KEY (`supplier_id`) REFERENCES `suppliers`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`part_id`) REFERENCES `parts`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`frozen_by_id`) REFERENCES `people`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE UNIQUE INDEX `drift_bases_version` ON `drift_bases` (`supplier_id`,`part_id`,`key`,`version`);--> statement-breakpoint
CREATE TABLE `logbook` (
	`sequence` integer PRIMARY KEY NOT NULL,
	`at` text NOT NULL,
	`actor_id` integer,
	`action` text NOT NULL,
	`subject_kind` text NOT NULL,
	`subject_id` text NOT NULL,
	`content` text NOT NULL,
	`salt` text NOT NULL,
	`content_hash` text NOT NULL,
	`previous_hash` text NOT NULL,
	`entry_hash` text NOT NULL
);
--> statement-breakpoint
CREATE INDEX `logbook_by_subject` ON `logbook` (`subject_kind`,`subject_id`);--> statement-breakpoint
CREATE INDEX `logbook_by_action` ON `logbook` (`action`,`at`);--> statement-breakpoint
CREATE TABLE `decisions` (
	`id` integer PRIMARY KEY NOT NULL,
	`lot_id` integer NOT NULL,
	`outcome` text NOT NULL,
	`overruled` integer NOT NULL,
	`reason` text DEFAULT '' NOT NULL,
	`lot_verdict` text NOT NULL,
	`evidence_hash` text NOT NULL,
	`signed_by_id` integer NOT NULL,
	`signed_at` text NOT NULL,
	FOREIGN KEY (`lot_id`) REFERENCES `lots`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`signed_by_id`) REFERENCES `people`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE UNIQUE INDEX `decisions_lot_id_unique` ON `decisions` (`lot_id`);--> statement-breakpoint
CREATE TABLE `lot_serials` (
	`lot_id` integer NOT NULL,
	`position` integer NOT NULL,
	`serial` text NOT NULL,
	PRIMARY KEY(`lot_id`, `position`),
	FOREIGN KEY (`lot_id`) REFERENCES `lots`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE UNIQUE INDEX `lot_serials_serial` ON `lot_serials` (`lot_id`,`serial`);--> statement-breakpoint
CREATE TABLE `lots` (
	`id` integer PRIMARY KEY NOT NULL,
	`number` text NOT NULL,
	`supplier_id` integer NOT NULL,
	`part_id` integer NOT NULL,
	`supplier_lot` text NOT NULL,
	`quantity` integer NOT NULL,
	`order_number` text DEFAULT '' NOT NULL,
	`unit_price` real,
	`remarks` text DEFAULT '' NOT NULL,
	`state` text NOT NULL,
	`sheet_id` integer NOT NULL,
	`severity` text NOT NULL,
	`severity_reason` text NOT NULL,
	`plan` text NOT NULL,
	`draw_seed` text NOT NULL,
	`draw_generator` text NOT NULL,
	`resubmission_of_id` integer,
	`received_by_id` integer NOT NULL,
	`received_at` text NOT NULL,
	`decided_at` text,
	FOREIGN KEY (`supplier_id`) REFERENCES `suppliers`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`part_id`) REFERENCES `parts`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`sheet_id`) REFERENCES `limit_sheets`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`resubmission_of_id`) REFERENCES `lots`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`received_by_id`) REFERENCES `people`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE UNIQUE INDEX `lots_number_unique` ON `lots` (`number`);--> statement-breakpoint
CREATE UNIQUE INDEX `lots_by_supplier_lot` ON `lots` (`supplier_id`,`part_id`,`supplier_lot`);--> statement-breakpoint
CREATE INDEX `lots_by_state` ON `lots` (`state`,`received_at`);--> statement-breakpoint
CREATE INDEX `lots_by_part` ON `lots` (`part_id`,`supplier_id`,`received_at`);--> statement-breakpoint
CREATE TABLE `samples` (
	`id` integer PRIMARY KEY NOT NULL,
	`lot_id` integer NOT NULL,
	`draw_order` integer NOT NULL,
	`position` integer NOT NULL,
	`serial` text,
	`bound_by_id` integer,
	`bound_at` text,
	FOREIGN KEY (`lot_id`) REFERENCES `lots`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`bound_by_id`) REFERENCES `people`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE UNIQUE INDEX `samples_order` ON `samples` (`lot_id`,`draw_order`);--> statement-breakpoint
CREATE UNIQUE INDEX `samples_position` ON `samples` (`lot_id`,`position`);--> statement-breakpoint
CREATE UNIQUE INDEX `samples_serial` ON `samples` (`lot_id`,`serial`);--> statement-breakpoint
CREATE INDEX `samples_by_serial` ON `samples` (`serial`);--> statement-breakpoint
CREATE TABLE `switching_actions` (
	`id` integer PRIMARY KEY NOT NULL,
	`supplier_id` integer NOT NULL,
	`part_id` integer NOT NULL,
	`kind` text NOT NULL,
	`reason` text NOT NULL,
	`by_id` integer NOT NULL,
	`at` text NOT NULL,
	FOREIGN KEY (`supplier_id`) REFERENCES `suppliers`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`part_id`) REFERENCES `parts`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`by_id`) REFERENCES `people`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE INDEX `switching_actions_by_part` ON `switching_actions` (`supplier_id`,`part_id`,`at`);--> statement-breakpoint
CREATE TABLE `measurement_files` (
	`measurement_id` integer NOT NULL,
	`ordinal` integer NOT NULL,
	`sha256` text NOT NULL,
	`name` text NOT NULL,
	PRIMARY KEY(`measurement_id`, `ordinal`),
	FOREIGN KEY (`measurement_id`) REFERENCES `measurements`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`sha256`) REFERENCES `raw_files`(`sha256`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE INDEX `measurement_files_by_file` ON `measurement_files` (`sha256`);--> statement-breakpoint
CREATE TABLE `measurement_values` (
	`measurement_id` integer NOT NULL,
	`key` text NOT NULL,
	`value` real NOT NULL,
	`expanded_uncertainty` real,
	`unit` text NOT NULL,
	PRIMARY KEY(`measurement_id`, `key`),
	FOREIGN KEY (`measurement_id`) REFERENCES `measurements`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE TABLE `measurements` (
	`id` integer PRIMARY KEY NOT NULL,
	`lot_id` integer NOT NULL,
	`sample_id` integer NOT NULL,
	`attempt` integer NOT NULL,
	`method` text NOT NULL,
	`rig_id` integer NOT NULL,
	`calibration_id` integer NOT NULL,
	`sheet_id` integer NOT NULL,
	`engine_version` text NOT NULL,
	`result` text NOT NULL,
	`verdict` text,
	`judgement` text NOT NULL,
	`reason` text DEFAULT '' NOT NULL,
	`measured_by_id` integer NOT NULL,
	`measured_at` text NOT NULL,
	`voided_at` text,
	`voided_by_id` integer,
	`void_reason` text,
	FOREIGN KEY (`lot_id`) REFERENCES `lots`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`sample_id`) REFERENCES `samples`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`rig_id`) REFERENCES `rigs`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`calibration_id`) REFERENCES `calibrations`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`sheet_id`) REFERENCES `limit_sheets`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`measured_by_id`) REFERENCES `people`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`voided_by_id`) REFERENCES `people`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE UNIQUE INDEX `measurements_attempt` ON `measurements` (`sample_id`,`attempt`);--> statement-breakpoint
CREATE INDEX `measurements_by_lot` ON `measurements` (`lot_id`);--> statement-breakpoint
CREATE TABLE `raw_files` (
	`sha256` text PRIMARY KEY NOT NULL,
	`size` integer NOT NULL,
	`stored_at` text NOT NULL
);
--> statement-breakpoint
CREATE TABLE `uploads` (
	`id` integer PRIMARY KEY NOT NULL,
	`lot_id` integer NOT NULL,
	`sample_id` integer,
	`name` text NOT NULL,
	`sha256` text NOT NULL,
	`rig_id` integer NOT NULL,
	`state` text NOT NULL,
	`fault` text,
	`recipe` text,
	`measurement_id` integer,
	`uploaded_by_id` integer NOT NULL,
	`uploaded_at` text NOT NULL,
	FOREIGN KEY (`lot_id`) REFERENCES `lots`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`sample_id`) REFERENCES `samples`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`sha256`) REFERENCES `raw_files`(`sha256`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`rig_id`) REFERENCES `rigs`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`measurement_id`) REFERENCES `measurements`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`uploaded_by_id`) REFERENCES `people`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE INDEX `uploads_by_lot` ON `uploads` (`lot_id`,`state`);--> statement-breakpoint
CREATE INDEX `uploads_by_sample` ON `uploads` (`sample_id`);--> statement-breakpoint
CREATE INDEX `uploads_by_file` ON `uploads` (`sha256`);--> statement-breakpoint
CREATE TABLE `counters` (
	`name` text PRIMARY KEY NOT NULL,
	`value` integer NOT NULL
);
--> statement-breakpoint
CREATE TABLE `papers` (
	`id` integer PRIMARY KEY NOT NULL,
	`number` text NOT NULL,
	`kind` text NOT NULL,
	`lot_id` integer NOT NULL,
	`decision_id` integer NOT NULL,
	`token` text NOT NULL,
	`record` text NOT NULL,
	`record_sha256` text NOT NULL,
	`signature` text NOT NULL,
	`key_id` text NOT NULL,
	`state` text NOT NULL,
	`issued_by_id` integer NOT NULL,
	`issued_at` text NOT NULL,
	`pdf_sha256` text,
	`pdf_drawn_at` text,
	`ended_at` text,
	`ended_by_id` integer,
	`ended_reason` text,
	FOREIGN KEY (`lot_id`) REFERENCES `lots`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`decision_id`) REFERENCES `decisions`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`key_id`) REFERENCES `signing_keys`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`issued_by_id`) REFERENCES `people`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`ended_by_id`) REFERENCES `people`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE UNIQUE INDEX `papers_number_unique` ON `papers` (`number`);--> statement-breakpoint
CREATE UNIQUE INDEX `papers_token_unique` ON `papers` (`token`);--> statement-breakpoint
CREATE INDEX `papers_by_lot` ON `papers` (`lot_id`);--> statement-breakpoint
CREATE INDEX `papers_by_issue` ON `papers` (`issued_at`);--> statement-breakpoint
CREATE TABLE `signing_keys` (
	`id` text PRIMARY KEY NOT NULL,
	`public_key_pem` text NOT NULL,
	`created_at` text NOT NULL,
	`retired_at` text
);
--> statement-breakpoint
CREATE TABLE `limit_sheets` (
	`id` integer PRIMARY KEY NOT NULL,
	`part_id` integer NOT NULL,
	`version` integer NOT NULL,
	`state` text NOT NULL,
	`content` text NOT NULL,
	`reason` text DEFAULT '' NOT NULL,
	`author_id` integer NOT NULL,
	`created_at` text NOT NULL,
	`submitted_at` text,
	`approved_by_id` integer,
	`approved_at` text,
	`approval_reason` text,
	`effective_from` text,
	`retired_at` text,
	FOREIGN KEY (`part_id`) REFERENCES `parts`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`author_id`) REFERENCES `people`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`approved_by_id`) REFERENCES `people`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE UNIQUE INDEX `limit_sheets_version` ON `limit_sheets` (`part_id`,`version`);--> statement-breakpoint
CREATE INDEX `limit_sheets_by_part` ON `limit_sheets` (`part_id`,`state`);--> statement-breakpoint
CREATE TABLE `part_suppliers` (
	`part_id` integer NOT NULL,
	`supplier_id` integer NOT NULL,
	`supplier_part_number` text DEFAULT '' NOT NULL,
	`unit_price` real,
	PRIMARY KEY(`part_id`, `supplier_id`),
	FOREIGN KEY (`part_id`) REFERENCES `parts`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`supplier_id`) REFERENCES `suppliers`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE TABLE `parts` (
	`id` integer PRIMARY KEY NOT NULL,
	`number` text NOT NULL,
	`name` text NOT NULL,
	`revision` text DEFAULT '' NOT NULL,
	`design` text NOT NULL,
	`rated_torque_nm` real,
	`torque_constant_nm_per_a` real,
	`phase_resistance_ohm` real,
	`rotor_inertia_kg_m2` real,
	`created_at` text NOT NULL
);
--> statement-breakpoint
CREATE UNIQUE INDEX `parts_number_unique` ON `parts` (`number`);--> statement-breakpoint
CREATE TABLE `people` (
	`id` integer PRIMARY KEY NOT NULL,
	`name` text NOT NULL,
	`email` text NOT NULL,
	`role` text NOT NULL,
	`supplier_id` integer,
	`notice_rank` integer,
	`password_hash` text NOT NULL,
	`password_version` integer DEFAULT 1 NOT NULL,
	`disabled_at` text,
	`created_at` text NOT NULL,
	FOREIGN KEY (`supplier_id`) REFERENCES `suppliers`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE UNIQUE INDEX `people_email_unique` ON `people` (`email`);--> statement-breakpoint
CREATE INDEX `people_by_supplier` ON `people` (`supplier_id`);--> statement-breakpoint
CREATE TABLE `sessions` (
	`id` text PRIMARY KEY NOT NULL,
	`person_id` integer NOT NULL,
	`password_version` integer NOT NULL,
	`created_at` text NOT NULL,
	`seen_at` text NOT NULL,
	`ended_at` text,
	FOREIGN KEY (`person_id`) REFERENCES `people`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE INDEX `sessions_by_person` ON `sessions` (`person_id`);--> statement-breakpoint
CREATE TABLE `sign_in_failures` (
	`key` text PRIMARY KEY NOT NULL,
	`count` integer NOT NULL,
	`last_at` text NOT NULL
);
--> statement-breakpoint
CREATE TABLE `suppliers` (
	`id` integer PRIMARY KEY NOT NULL,
	`code` text NOT NULL,
	`name` text NOT NULL,
	`address` text DEFAULT '' NOT NULL,
	`language` text DEFAULT 'en' NOT NULL,
	`created_at` text NOT NULL
);
--> statement-breakpoint
CREATE UNIQUE INDEX `suppliers_code_unique` ON `suppliers` (`code`);--> statement-breakpoint
CREATE UNIQUE INDEX `suppliers_name_unique` ON `suppliers` (`name`);--> statement-breakpoint
CREATE TABLE `nonconformance_entries` (
	`id` integer PRIMARY KEY NOT NULL,
	`nonconformance_id` integer NOT NULL,
	`kind` text NOT NULL,
	`text` text NOT NULL,
	`by_id` integer,
	`at` text NOT NULL,
	FOREIGN KEY (`nonconformance_id`) REFERENCES `nonconformances`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`by_id`) REFERENCES `people`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE INDEX `nonconformance_entries_by_parent` ON `nonconformance_entries` (`nonconformance_id`,`at`);--> statement-breakpoint
CREATE TABLE `nonconformances` (
	`id` integer PRIMARY KEY NOT NULL,
	`number` text NOT NULL,
	`lot_id` integer NOT NULL,
	`supplier_id` integer NOT NULL,
	`state` text NOT NULL,
	`opened_at` text NOT NULL,
	`answer_due_on` text NOT NULL,
	`acknowledged_at` text,
	`acknowledged_by_id` integer,
	`disposition` text,
	`disposition_reason` text,
	`disposition_by_id` integer,
	`disposition_at` text,
	`closed_at` text,
	FOREIGN KEY (`lot_id`) REFERENCES `lots`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`supplier_id`) REFERENCES `suppliers`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`acknowledged_by_id`) REFERENCES `people`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`disposition_by_id`) REFERENCES `people`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE UNIQUE INDEX `nonconformances_number_unique` ON `nonconformances` (`number`);--> statement-breakpoint
CREATE UNIQUE INDEX `nonconformances_lot_id_unique` ON `nonconformances` (`lot_id`);--> statement-breakpoint
CREATE INDEX `nonconformances_by_supplier` ON `nonconformances` (`supplier_id`,`state`);--> statement-breakpoint
CREATE TABLE `notices` (
	`id` integer PRIMARY KEY NOT NULL,
	`message_id` text NOT NULL,
	`kind` text NOT NULL,
	`nonconformance_id` integer,
	`lot_id` integer,
	`recipient_id` integer,
	`recipient_address` text NOT NULL,
	`subject` text NOT NULL,
	`text` text NOT NULL,
	`html` text NOT NULL,
	`paper_id` integer,
	`state` text NOT NULL,
	`attempts` integer DEFAULT 0 NOT NULL,
	`next_attempt_at` text NOT NULL,
	`last_error` text,
	`sent_at` text,
	`created_at` text NOT NULL,
	FOREIGN KEY (`nonconformance_id`) REFERENCES `nonconformances`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`lot_id`) REFERENCES `lots`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`recipient_id`) REFERENCES `people`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`paper_id`) REFERENCES `papers`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE UNIQUE INDEX `notices_message_id_unique` ON `notices` (`message_id`);--> statement-breakpoint
CREATE INDEX `notices_by_state` ON `notices` (`state`,`next_attempt_at`);--> statement-breakpoint
CREATE TABLE `calibrations` (
	`id` integer PRIMARY KEY NOT NULL,
	`rig_id` integer NOT NULL,
	`certificate_number` text NOT NULL,
	`laboratory` text NOT NULL,
	`performed_on` text NOT NULL,
	`due_on` text NOT NULL,
	`torque_relative_uncertainty` real NOT NULL,
	`torque_absolute_uncertainty_nm` real NOT NULL,
	`remarks` text DEFAULT '' NOT NULL,
	`entered_by_id` integer NOT NULL,
	`entered_at` text NOT NULL,
	FOREIGN KEY (`rig_id`) REFERENCES `rigs`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`entered_by_id`) REFERENCES `people`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE INDEX `calibrations_by_rig` ON `calibrations` (`rig_id`,`performed_on`);--> statement-breakpoint
CREATE TABLE `rigs` (
	`id` integer PRIMARY KEY NOT NULL,
	`code` text NOT NULL,
	`name` text NOT NULL,
	`method` text NOT NULL,
	`location` text DEFAULT '' NOT NULL,
	`properties` text NOT NULL,
	`recipe` text,
	`recipe_confirmed_by_id` integer,
	`recipe_confirmed_at` text,
	`created_at` text NOT NULL,
	FOREIGN KEY (`recipe_confirmed_by_id`) REFERENCES `people`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE UNIQUE INDEX `rigs_code_unique` ON `rigs` (`code`);