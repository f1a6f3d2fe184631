-- What is known of a demand ends with anything that it stands on, whoever changes it.
CREATE TRIGGER demand_state_reading_insert AFTER INSERT ON reading
BEGIN DELETE FROM demand_state WHERE system_id = NEW.system_id; END;
--> statement-breakpoint
CREATE TRIGGER demand_state_reading_update AFTER UPDATE ON reading
BEGIN DELETE FROM demand_state WHERE system_id IN (OLD.system_id, NEW.system_id); END;
--> statement-breakpoint
CREATE TRIGGER demand_state_reading_delete AFTER DELETE ON reading
BEGIN DELETE FROM demand_state WHERE system_id = OLD.system_id; END;
--> statement-breakpoint
CREATE TRIGGER demand_state_water_change_insert AFTER INSERT ON water_change
BEGIN DELETE FROM demand_state WHERE system_id = NEW.system_id; END;
--> statement-breakpoint
CREATE TRIGGER demand_state_water_change_update AFTER UPDATE ON water_change
BEGIN DELETE FROM demand_state WHERE system_id IN (OLD.system_id, NEW.system_id); END;
--> statement-breakpoint
CREATE TRIGGER demand_state_water_change_delete AFTER DELETE ON water_change
BEGIN DELETE FROM demand_state WHERE system_id = OLD.system_id; END;
--> statement-breakpoint
CREATE TRIGGER demand_state_dose_insert AFTER INSERT ON dose
BEGIN DELETE FROM demand_state WHERE system_id = NEW.system_id; END;
--> statement-breakpoint
CREATE TRIGGER demand_state_dose_update AFTER UPDATE ON dose
BEGIN DELETE FROM demand_state WHERE system_id IN (OLD.system_id, NEW.system_id); END;
--> statement-breakpoint
CREATE TRIGGER demand_state_dose_delete AFTER DELETE ON dose
BEGIN DELETE FROM demand_state WHERE system_id = OLD.system_id; END;
--> statement-breakpoint
CREATE TRIGGER demand_state_dosing_rate_insert AFTER INSERT ON dosing_rate
BEGIN DELETE FROM demand_state WHERE system_id = NEW.system_id; END;
--> statement-breakpoint
CREATE TRIGGER demand_state_dosing_rate_update AFTER UPDATE ON dosing_rate
BEGIN DELETE FROM demand_state WHERE system_id IN (OLD.system_id, NEW.system_id); END;
--> statement-breakpoint
CREATE TRIGGER demand_state_dosing_rate_delete AFTER DELETE ON dosing_rate
BEGIN DELETE FROM demand_state WHERE system_id = OLD.system_id; END;
--> statement-breakpoint
CREATE TRIGGER demand_state_reservoir_event_insert AFTER INSERT ON reservoir_event
BEGIN DELETE FROM demand_state; END;
--> statement-breakpoint
CREATE TRIGGER demand_state_reservoir_event_update AFTER UPDATE ON reservoir_event
BEGIN DELETE FROM demand_state; END;
--> statement-breakpoint
CREATE TRIGGER demand_state_reservoir_event_delete AFTER DELETE ON reservoir_event
BEGIN DELETE FROM demand_state; END;
--> statement-breakpoint
CREATE TRIGGER demand_state_reservoir_feed_insert AFTER INSERT ON reservoir_feed
BEGIN DELETE FROM demand_state; END;
--> statement-breakpoint
CREATE TRIGGER demand_state_reservoir_feed_update AFTER UPDATE ON reservoir_feed
BEGIN DELETE FROM demand_state; END;
--> statement-breakpoint
CREATE TRIGGER demand_state_reservoir_feed_delete AFTER DELETE ON reservoir_feed
BEGIN DELETE FROM demand_state; END;
--> statement-breakpoint
CREATE TRIGGER demand_state_pump_calibration_insert AFTER INSERT ON pump_calibration
BEGIN DELETE FROM demand_state; END;
--> statement-breakpoint
CREATE TRIGGER demand_state_pump_calibration_update AFTER UPDATE ON pump_calibration
BEGIN DELETE FROM demand_state; END;
--> statement-breakpoint
CREATE TRIGGER demand_state_pump_calibration_delete AFTER DELETE ON pump_calibration
BEGIN DELETE FROM demand_state; END;
--> statement-breakpoint
CREATE TRIGGER demand_state_system_update AFTER UPDATE OF net_volume_l ON system
BEGIN DELETE FROM demand_state WHERE system_id = NEW.id; END;
--> statement-breakpoint
CREATE TRIGGER demand_state_item_update AFTER UPDATE OF strength, calcium_mg, magnesium_mg ON item
BEGIN DELETE FROM demand_state; END;
