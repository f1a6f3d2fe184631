-- What the guards of the stock ledger left open.
CREATE TRIGGER stock_movement_check_place BEFORE INSERT ON stock_movement
BEGIN
  -- INSERT OR IGNORE would move the pieces and leave the plug where it was.
  SELECT RAISE(ABORT, 'Another plug already stands at that position.')
  WHERE NEW.to_position IS NOT NULL AND EXISTS (
    SELECT 1 FROM plug WHERE account_id = NEW.to_account_id AND position = NEW.to_position
      AND code IS NOT NEW.plug_code);
  -- A piece on a plug goes by its plug, or the plug would stay behind without one.
  SELECT RAISE(ABORT, 'stock.not_enough')
  WHERE NEW.plug_code IS NULL
    AND NOT EXISTS (SELECT 1 FROM stock_account WHERE id = NEW.from_account_id AND is_source = 1)
    AND coalesce((SELECT pieces FROM stock_balance
        WHERE batch_id = NEW.batch_id AND account_id = NEW.from_account_id), 0)
      - (SELECT count(*) FROM plug WHERE account_id = NEW.from_account_id AND batch_id = NEW.batch_id)
      < NEW.pieces;
  SELECT RAISE(ABORT, 'Pieces go back to the cut, or come back from where they left, only by a reversal.')
  WHERE NEW.kind <> 'reversal' AND (
    EXISTS (SELECT 1 FROM stock_account WHERE id = NEW.to_account_id AND kind = 'cut')
    OR EXISTS (SELECT 1 FROM stock_account
      WHERE id = NEW.from_account_id AND kind IN ('sold', 'lost', 'culled', 'recut', 'given')));
END;
--> statement-breakpoint
CREATE TRIGGER hold_stays_on_batch BEFORE UPDATE OF batch_id ON hold
WHEN NEW.batch_id <> OLD.batch_id
BEGIN SELECT RAISE(ABORT, 'A promise stays on its batch. Free it and promise anew.'); END;
--> statement-breakpoint
-- INSERT OR REPLACE takes the old row away without asking the triggers on deleting.
CREATE TRIGGER audit_log_no_replace BEFORE INSERT ON audit_log
WHEN EXISTS (SELECT 1 FROM audit_log WHERE id = NEW.id)
BEGIN SELECT RAISE(ABORT, 'The audit log is never edited.'); END;
--> statement-breakpoint
CREATE TRIGGER invoice_no_replace BEFORE INSERT ON invoice
WHEN EXISTS (SELECT 1 FROM invoice WHERE id = NEW.id OR number = NEW.number OR order_id = NEW.order_id)
BEGIN SELECT RAISE(ABORT, 'Invoices are never changed.'); END;
