-- The laws of the stock ledger, kept by the database itself.
INSERT INTO ledger_gate (id, open) VALUES (1, 0);
--> statement-breakpoint
CREATE TRIGGER stock_movement_no_update BEFORE UPDATE ON stock_movement
BEGIN SELECT RAISE(ABORT, 'Movements are never edited. Reverse it instead.'); END;
--> statement-breakpoint
CREATE TRIGGER stock_movement_no_delete BEFORE DELETE ON stock_movement
BEGIN SELECT RAISE(ABORT, 'Movements are never deleted. Reverse it instead.'); END;
--> statement-breakpoint
CREATE TRIGGER stock_movement_check BEFORE INSERT ON stock_movement
BEGIN
  -- INSERT OR REPLACE would take the old row away without asking the delete trigger.
  SELECT RAISE(ABORT, 'Movements are never edited. Reverse it instead.')
  WHERE EXISTS (SELECT 1 FROM stock_movement WHERE id = NEW.id);
  SELECT RAISE(ABORT, 'Pieces are whole.') WHERE NEW.pieces <> CAST(NEW.pieces AS INTEGER);
  SELECT RAISE(ABORT, 'stock.already_reversed')
  WHERE NEW.reverses_id IS NOT NULL
    AND EXISTS (SELECT 1 FROM stock_movement WHERE reverses_id = NEW.reverses_id);
  SELECT RAISE(ABORT, 'stock.not_there')
  WHERE NEW.plug_code IS NOT NULL AND NOT EXISTS (
    SELECT 1 FROM plug
    WHERE plug.code = NEW.plug_code AND plug.batch_id = NEW.batch_id
      AND (plug.account_id = NEW.from_account_id
        OR (plug.account_id IS NULL AND EXISTS (
          SELECT 1 FROM stock_account WHERE id = NEW.from_account_id AND kind = 'cut')))
      AND plug.position IS NEW.from_position);
  SELECT RAISE(ABORT, 'stock.not_enough')
  WHERE NOT EXISTS (SELECT 1 FROM stock_account WHERE id = NEW.from_account_id AND is_source = 1)
    AND coalesce((SELECT pieces FROM stock_balance
      WHERE batch_id = NEW.batch_id AND account_id = NEW.from_account_id), 0) < NEW.pieces;
  SELECT RAISE(ABORT, 'A position belongs to a plug on a rack.')
  WHERE NEW.to_position IS NOT NULL AND (NEW.plug_code IS NULL OR NOT EXISTS (
    SELECT 1 FROM stock_account WHERE id = NEW.to_account_id AND kind = 'rack'));
  SELECT RAISE(ABORT, 'A reversal mirrors the movement that it names.')
  WHERE (NEW.kind = 'reversal') <> (NEW.reverses_id IS NOT NULL)
    OR (NEW.reverses_id IS NOT NULL AND NOT EXISTS (
      SELECT 1 FROM stock_movement AS original
      WHERE original.id = NEW.reverses_id AND original.kind <> 'reversal'
        AND original.batch_id = NEW.batch_id AND original.plug_code IS NEW.plug_code
        AND original.pieces = NEW.pieces
        AND original.from_account_id = NEW.to_account_id AND original.to_account_id = NEW.from_account_id
        AND original.from_position IS NEW.to_position AND original.to_position IS NEW.from_position));
END;
--> statement-breakpoint
CREATE TRIGGER stock_movement_post AFTER INSERT ON stock_movement
BEGIN
  UPDATE ledger_gate SET open = 1 WHERE id = 1;
  -- Rows start at zero: an upsert would have its first value checked even where the row exists.
  INSERT INTO stock_balance (batch_id, account_id, pieces, is_source)
    SELECT NEW.batch_id, id, 0, is_source FROM stock_account
    WHERE id IN (NEW.from_account_id, NEW.to_account_id)
    ON CONFLICT (batch_id, account_id) DO NOTHING;
  UPDATE stock_balance SET pieces = pieces - NEW.pieces
    WHERE batch_id = NEW.batch_id AND account_id = NEW.from_account_id;
  UPDATE stock_balance SET pieces = pieces + NEW.pieces
    WHERE batch_id = NEW.batch_id AND account_id = NEW.to_account_id;
  UPDATE plug SET account_id = NEW.to_account_id, position = NEW.to_position WHERE code = NEW.plug_code;
  UPDATE ledger_gate SET open = 0, posted_id = NEW.id WHERE id = 1;
END;
--> statement-breakpoint
-- The gate opens only for a movement that is not posted yet, which is never so outside the trigger above.
CREATE TRIGGER ledger_gate_guard BEFORE UPDATE ON ledger_gate
WHEN NOT (
  (OLD.open = 0 AND NEW.open = 1 AND NEW.id = OLD.id AND NEW.posted_id = OLD.posted_id
    AND OLD.posted_id < coalesce((SELECT max(id) FROM stock_movement), 0))
  OR (OLD.open = 1 AND NEW.open = 0 AND NEW.id = OLD.id
    AND NEW.posted_id = (SELECT max(id) FROM stock_movement)))
BEGIN SELECT RAISE(ABORT, 'The ledger opens for its own movements only.'); END;
--> statement-breakpoint
CREATE TRIGGER ledger_gate_no_insert BEFORE INSERT ON ledger_gate
BEGIN SELECT RAISE(ABORT, 'The ledger has one gate.'); END;
--> statement-breakpoint
CREATE TRIGGER ledger_gate_no_delete BEFORE DELETE ON ledger_gate
BEGIN SELECT RAISE(ABORT, 'The ledger has one gate.'); END;
--> statement-breakpoint
CREATE TRIGGER stock_balance_gate_insert BEFORE INSERT ON stock_balance
WHEN (SELECT open FROM ledger_gate WHERE id = 1) = 0
BEGIN SELECT RAISE(ABORT, 'Balances change through movements only.'); END;
--> statement-breakpoint
CREATE TRIGGER stock_balance_gate_update BEFORE UPDATE ON stock_balance
WHEN (SELECT open FROM ledger_gate WHERE id = 1) = 0
BEGIN SELECT RAISE(ABORT, 'Balances change through movements only.'); END;
--> statement-breakpoint
CREATE TRIGGER stock_balance_gate_delete BEFORE DELETE ON stock_balance
WHEN (SELECT open FROM ledger_gate WHERE id = 1) = 0
BEGIN SELECT RAISE(ABORT, 'Balances change through movements only.'); END;
--> statement-breakpoint
CREATE TRIGGER plug_starts_nowhere BEFORE INSERT ON plug
WHEN NEW.account_id IS NOT NULL OR NEW.position IS NOT NULL
BEGIN SELECT RAISE(ABORT, 'A plug gets its place by a movement.'); END;
--> statement-breakpoint
CREATE TRIGGER plug_code_never_reused BEFORE INSERT ON plug
WHEN EXISTS (SELECT 1 FROM plug WHERE code = NEW.code OR (batch_id = NEW.batch_id AND number = NEW.number))
BEGIN SELECT RAISE(ABORT, 'Plug codes are never reused.'); END;
--> statement-breakpoint
CREATE TRIGGER plug_gate_update BEFORE UPDATE ON plug
WHEN (SELECT open FROM ledger_gate WHERE id = 1) = 0
  OR NEW.code <> OLD.code OR NEW.batch_id <> OLD.batch_id OR NEW.number <> OLD.number
BEGIN SELECT RAISE(ABORT, 'Plugs change place through movements only.'); END;
--> statement-breakpoint
CREATE TRIGGER plug_no_delete BEFORE DELETE ON plug
BEGIN SELECT RAISE(ABORT, 'Plug codes are never reused, so plugs are never deleted.'); END;
--> statement-breakpoint
CREATE TRIGGER stock_account_no_replace BEFORE INSERT ON stock_account
WHEN EXISTS (SELECT 1 FROM stock_account WHERE id = NEW.id
  OR (rack_id IS NOT NULL AND rack_id = NEW.rack_id)
  OR (rack_id IS NULL AND NEW.rack_id IS NULL AND kind = NEW.kind AND detail = NEW.detail))
BEGIN SELECT RAISE(ABORT, 'Stock accounts are never edited.'); END;
--> statement-breakpoint
CREATE TRIGGER stock_account_no_update BEFORE UPDATE ON stock_account
BEGIN SELECT RAISE(ABORT, 'Stock accounts are never edited.'); END;
--> statement-breakpoint
CREATE TRIGGER stock_account_no_delete BEFORE DELETE ON stock_account
BEGIN SELECT RAISE(ABORT, 'Stock accounts are never deleted.'); END;
--> statement-breakpoint
-- A promise never exceeds what stands on racks. Losses after the promise are allowed: the order is then short and says so.
CREATE TRIGGER hold_insert_within_stock BEFORE INSERT ON hold
BEGIN
  SELECT RAISE(ABORT, 'order.not_available')
  WHERE NEW.pieces + coalesce((SELECT sum(pieces) FROM hold WHERE batch_id = NEW.batch_id), 0)
    > coalesce((SELECT sum(b.pieces) FROM stock_balance b JOIN stock_account a ON a.id = b.account_id
        WHERE b.batch_id = NEW.batch_id AND a.kind = 'rack'), 0);
END;
--> statement-breakpoint
CREATE TRIGGER hold_update_within_stock BEFORE UPDATE OF pieces ON hold
WHEN NEW.pieces > OLD.pieces
BEGIN
  SELECT RAISE(ABORT, 'order.not_available')
  WHERE NEW.pieces - OLD.pieces + coalesce((SELECT sum(pieces) FROM hold WHERE batch_id = NEW.batch_id), 0)
    > coalesce((SELECT sum(b.pieces) FROM stock_balance b JOIN stock_account a ON a.id = b.account_id
        WHERE b.batch_id = NEW.batch_id AND a.kind = 'rack'), 0);
END;
--> statement-breakpoint
CREATE TRIGGER audit_log_no_update BEFORE UPDATE ON audit_log
BEGIN SELECT RAISE(ABORT, 'The audit log is never edited.'); END;
--> statement-breakpoint
CREATE TRIGGER audit_log_no_delete BEFORE DELETE ON audit_log
BEGIN SELECT RAISE(ABORT, 'The audit log is never edited.'); END;
--> statement-breakpoint
CREATE TRIGGER invoice_no_update BEFORE UPDATE ON invoice
BEGIN SELECT RAISE(ABORT, 'Invoices are never changed.'); END;
--> statement-breakpoint
CREATE TRIGGER invoice_no_delete BEFORE DELETE ON invoice
BEGIN SELECT RAISE(ABORT, 'Invoices are never changed.'); END;
