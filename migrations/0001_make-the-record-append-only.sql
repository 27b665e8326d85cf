CREATE DEFINER = 'stemma_definer'@'127.0.0.1' TRIGGER `audit_entry_append` BEFORE INSERT ON `audit_entry` FOR EACH ROW
BEGIN
	DECLARE last_seq BIGINT DEFAULT NULL;
	DECLARE last_hash BINARY(32) DEFAULT NULL;
	IF NEW.chain <> 'system' AND NOT EXISTS (SELECT 1 FROM `studies` WHERE `id` = NEW.chain) THEN
		SIGNAL SQLSTATE '45000' SET MYSQL_ERRNO = 31001, MESSAGE_TEXT = 'The decision log has no such chain.';
	END IF;
	SELECT `seq`, `hash` INTO last_seq, last_hash FROM `audit_head` WHERE `chain` = NEW.chain FOR UPDATE;
	IF last_seq IS NULL THEN
		SET last_seq = 0, last_hash = UNHEX(REPEAT('00', 32));
		INSERT INTO `audit_head` (`chain`, `seq`, `hash`) VALUES (NEW.chain, last_seq, last_hash);
	END IF;
	SET NEW.seq = last_seq + 1;
	SET NEW.at = SYSDATE(6);
	SET NEW.payload_hash = UNHEX(SHA2(NEW.payload, 256));
	SET NEW.prev_hash = last_hash;
	SET NEW.hash = UNHEX(SHA2(CONCAT(
		'stemma-log-1\n',
		RPAD(NEW.chain, 36, ' '),
		LOWER(HEX(NEW.prev_hash)),
		LPAD(NEW.seq, 20, '0'),
		DATE_FORMAT(NEW.at, '%Y-%m-%d %H:%i:%s.%f'),
		RPAD(NEW.actor_id, 36, ' '),
		RPAD(NEW.kind, 60, ' '),
		LOWER(HEX(NEW.payload_hash))
	), 256));
	UPDATE `audit_head` SET `seq` = NEW.seq, `hash` = NEW.hash WHERE `chain` = NEW.chain;
END
--> statement-breakpoint
CREATE DEFINER = 'stemma_definer'@'127.0.0.1' TRIGGER `audit_entry_keep` BEFORE UPDATE ON `audit_entry` FOR EACH ROW
	SIGNAL SQLSTATE '45000' SET MYSQL_ERRNO = 31002, MESSAGE_TEXT = 'Entries of the decision log are never changed.';
--> statement-breakpoint
CREATE DEFINER = 'stemma_definer'@'127.0.0.1' TRIGGER `audit_entry_stay` BEFORE DELETE ON `audit_entry` FOR EACH ROW
	SIGNAL SQLSTATE '45000' SET MYSQL_ERRNO = 31003, MESSAGE_TEXT = 'Entries of the decision log are never removed.';
--> statement-breakpoint
CREATE DEFINER = 'stemma_definer'@'127.0.0.1' TRIGGER `signatures_keep` BEFORE UPDATE ON `signatures` FOR EACH ROW
	SIGNAL SQLSTATE '45000' SET MYSQL_ERRNO = 31004, MESSAGE_TEXT = 'Signatures are never changed.';
--> statement-breakpoint
CREATE DEFINER = 'stemma_definer'@'127.0.0.1' TRIGGER `signatures_stay` BEFORE DELETE ON `signatures` FOR EACH ROW
	SIGNAL SQLSTATE '45000' SET MYSQL_ERRNO = 31005, MESSAGE_TEXT = 'Signatures are never removed.';
