package data

import (
	"errors"
	"strings"
	"testing"

	"afterbeat/data/unit"
)

// channelsNamed makes channels as reading would, from their headers.
func channelsNamed(headers string) []Channel {
	var out []Channel
	for _, h := range headings(strings.Fields(headers)) {
		out = append(out, channelOf(h, nil))
	}
	return out
}

func nameAt(channels []Channel, i int) string {
	if i < 0 {
		return ""
	}
	return channels[i].Name.String()
}

func TestChoose(t *testing.T) {
	for _, c := range []struct {
		headers                  string
		roles                    Roles
		pressure, flow, velocity string
	}{
		// the headers of real recordings
		{"abp_mmHg mcav_cm_s hr_bpm", Roles{}, "abp_mmHg", "", "mcav_cm_s"},
		{"aortic_flow_mL_s aortic_pressure_mmHg radial_pressure_mmHg", Roles{}, "aortic_pressure_mmHg", "aortic_flow_mL_s", ""},
		{"abp_mmHg ecg_mcl1_mV", Roles{}, "abp_mmHg", "", ""},
		{"abp_mmHg pap_mmHg pleth_adu", Roles{}, "abp_mmHg", "", ""},
		{"carotid_pressure_V trigger_V", Roles{}, "carotid_pressure_V", "", ""},

		{"radial_pressure_mmHg aortic_pressure_mmHg", Roles{}, "aortic_pressure_mmHg", "", ""},
		{"finger_mmHg abp_mmHg", Roles{}, "abp_mmHg", "", ""},
		{"pressure_mmHg radial_mmHg", Roles{}, "pressure_mmHg", "", ""},
		{"abp_mmHg ao_mmHg", Roles{}, "ao_mmHg", "", ""},
		{"pressure_mmHg art_mmHg", Roles{}, "art_mmHg", "", ""},
		{"aortic_mmHg radial_mmHg radial_flow_mL_min", Roles{}, "radial_mmHg", "radial_flow_mL_min", ""},
		{"aortic_mmHg carotid_mmHg carotid_cm_s mca_cm_s", Roles{Velocity: "carotid_cm_s"}, "carotid_mmHg", "", "carotid_cm_s"},
		{"carotid_mmHg carotid_cm_s mca_cm_s", Roles{}, "carotid_mmHg", "", "carotid_cm_s"},
		{"femoral_mmHg aortic_mmHg femoral_flow_mL_s aortic_flow_mL_s", Roles{}, "aortic_mmHg", "aortic_flow_mL_s", ""},
		{"femoral_mmHg aortic_mmHg femoral_flow_mL_s aortic_flow_mL_s", Roles{Pressure: "femoral_mmHg"}, "femoral_mmHg", "femoral_flow_mL_s", ""},
		{"pressure_V radial_mmHg", Roles{}, "radial_mmHg", "", ""},
		{"flow_V mca_cm_s", Roles{}, "", "", "mca_cm_s"},
		{"flow_V mca_V", Roles{}, "", "flow_V", ""},
		{"flow_mL_s mca_cm_s", Roles{}, "", "flow_mL_s", ""},
		{"flow_mL_s mca_cm_s", Roles{Velocity: "MCA"}, "", "", "mca_cm_s"},
		{"flow_mL_s mca_cm_s", Roles{Velocity: "mca", Flow: "flow"}, "", "flow_mL_s", "mca_cm_s"},
		{"abp_mmHg pump_flow_L_min", Roles{}, "abp_mmHg", "", ""},
		{"abp_mmHg lvad_flow_L_min aortic_flow_L_min", Roles{}, "abp_mmHg", "aortic_flow_L_min", ""},
		{"abp_mmHg pump_flow_L_min", Roles{Flow: "pump_flow"}, "abp_mmHg", "pump_flow_L_min", ""},
		{"abp_mmHg graft_flow_L_min", Roles{}, "abp_mmHg", "graft_flow_L_min", ""},
		{"mcav_left_cm_s mcav_right_cm_s", Roles{Velocity: "mcav_right_cm_s"}, "", "", "mcav_right_cm_s"},

		// never by guess
		{"pap_mmHg cvp_mmHg icp_mmHg PA_pressure_mmHg airway_cmH2O lvp_mmHg lap_mmHg pv_mmHg pulmonary_flow_mL_s mitral_cm_s etco2_kPa", Roles{}, "", "", ""},
		{"icp_mmHg", Roles{Pressure: "icp"}, "icp_mmHg", "", ""},
	} {
		channels := channelsNamed(c.headers)
		s, err := Choose(channels, c.roles)
		if err != nil {
			t.Errorf("%s %+v: %v", c.headers, c.roles, err)
			continue
		}
		p, f, v := nameAt(channels, s.Pressure), nameAt(channels, s.Flow), nameAt(channels, s.Velocity)
		if p != c.pressure || f != c.flow || v != c.velocity {
			t.Errorf("%s %+v: pressure %q, flow %q, velocity %q; want %q, %q, %q", c.headers, c.roles, p, f, v, c.pressure, c.flow, c.velocity)
		}
		guesses := 0
		for _, pair := range [][2]string{{p, c.roles.Pressure}, {f, c.roles.Flow}, {v, c.roles.Velocity}} {
			if pair[0] != "" && pair[1] == "" {
				guesses++
			}
		}
		if len(s.Guessed) != guesses {
			t.Errorf("%s %+v: %d guesses told, %d made", c.headers, c.roles, len(s.Guessed), guesses)
		}
	}
}

func TestChooseErrors(t *testing.T) {
	for _, c := range []struct {
		headers string
		roles   Roles
		want    string
	}{
		{"mcav_left_cm_s mcav_right_cm_s", Roles{}, "the velocity could be mcav_left_cm_s or mcav_right_cm_s; choose with --velocity NAME"},
		{"abp_mmHg mcav_left_cm_s mcav_right_cm_s", Roles{}, "choose with --velocity NAME"},
		{"abp1_mmHg abp2_mmHg abp3_mmHg", Roles{}, "the pressure could be abp1_mmHg, abp2_mmHg or abp3_mmHg; choose with --pressure NAME"},
		{"abp_mmHg abp_kPa", Roles{Pressure: "abp"}, "the name fits abp_mmHg or abp_kPa; choose with --pressure NAME"},
		{"abp_mmHg flow_mL_s", Roles{Pressure: "aprt"}, `there is no column "aprt"; the nearest is "abp_mmHg" (--pressure NAME)`},
		{"", Roles{Pressure: "abp"}, `there is no column "abp" (--pressure NAME)`},
		{"ch1 flow_mL_s", Roles{Pressure: "ch1"}, "ch1 is of quantity other, not pressure; state its unit with --unit ch1=mmHg"},
		{"abp_mmHg", Roles{Flow: "abp"}, "abp_mmHg is of quantity pressure, not flow; state its unit with --unit abp_mmHg=mL/s"},
	} {
		_, err := Choose(channelsNamed(c.headers), c.roles)
		if err == nil || !strings.Contains(err.Error(), c.want) {
			t.Errorf("%s %+v: %v, want %s", c.headers, c.roles, err, c.want)
		}
		var unknown *UnknownNameError
		var ambiguous *AmbiguousError
		var wrong *WrongRoleError
		if !errors.As(err, &unknown) && !errors.As(err, &ambiguous) && !errors.As(err, &wrong) {
			t.Errorf("%s: an error of type %T", c.headers, err)
		}
	}
}

func TestGuessSite(t *testing.T) {
	for header, want := range map[string]Site{
		"aortic_flow_mL_s": SiteRoot, "AoPressure [mmHg]": SiteRoot, "P_ao_mmHg": SiteRoot, "root_mmHg": SiteRoot, "PAO": SiteRoot,
		"lvot_cm_s": SiteLVOT, "outflow_graft_flow_L_min": SiteGraft, "lvad_graft_L_min": SiteGraft,
		"carotid_pressure_V": SiteCarotid, "CCA cm/s": SiteCarotid, "ICA_cm_s": SiteCarotid,
		"mcav_left_cm_s": SiteMCA, "MCAv": SiteMCA, "TCD cm/s": SiteMCA,
		"brachial_mmHg": SiteBrachial, "radial_pressure_mmHg": SiteRadial, "finger_mmHg": SiteFinger, "fin_mmHg": SiteFinger,
		"femoral_mmHg": SiteFemoral, "FemPressure": SiteFemoral, "renal_flow_mL_min": SiteRenal,
		"pump_flow_L_min": SitePump, "lvad_flow": SitePump,
		"abp_mmHg": SiteOther, "art": SiteOther, "arterial_mmHg": SiteOther, "flow": SiteOther, "cardiac output": SiteOther, "Q": SiteOther,
		"pulmonary_root_mmHg": SiteOther, "descending_aorta_mL_s": SiteOther, "abdominal aorta cm/s": SiteOther,
	} {
		if got := GuessSite(header, unit.Pressure); got != want {
			t.Errorf("GuessSite(%q) = %s, want %s", header, got, want)
		}
	}
	if got := GuessSite("aortic_valve_signal", unit.Other); got != SiteOther {
		t.Errorf("a channel without a quantity has site %s", got)
	}
}
