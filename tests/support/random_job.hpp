/// Random jobs of ordinary and of odd proportions, as JSON text, the same for the same seed.
#pragma once

#include <nlohmann/json.hpp>

#include <cmath>
#include <cstdio>
#include <random>
#include <string>
#include <vector>

namespace turnwright::testing {

class job_dice {
 public:
  explicit job_dice(unsigned seed) : dice_(seed) {}

  double real(double from, double to) { return std::uniform_real_distribution<double>(from, to)(dice_); }
  bool chance(double p) { return real(0, 1) < p; }
  template <class T>
  T one_of(const std::vector<T>& list) {
    return list[std::uniform_int_distribution<std::size_t>(0, list.size() - 1)(dice_)];
  }
  static std::string text(double x, const char* unit) {
    char room[64];
    std::snprintf(room, sizeof room, "%.4g %s", x, unit);
    return room;
  }

  /// A job whose HT feeds a rectifier with its rail, and whose bias, where it has one, a half-wave one.
  nlohmann::json rails_job(bool named_core) {
    nlohmann::json j = job(named_core);
    for (nlohmann::json& w : j["secondaries"]) {
      if (w["name"] == "HT") rectify(w);
      if (w["name"] == "bias") {
        w.erase("current");
        w["circuit"] = "half-wave";
        w["polarity"] = "negative";
        w["rail"] = {{{"node", "A"}, {"capacitor", "47 uF"}, {"load", text(real(10, 100), "kohm")}}};
      }
    }
    // A tap wants an end that stays at earth.
    for (auto at = j["secondaries"].begin(); at != j["secondaries"].end(); ++at) {
      if ((*at)["name"] == "bias" && j["secondaries"][0].value("circuit", "") != "full-wave centre-tap" &&
          j["secondaries"][0].value("circuit", "") != "half-wave") {
        j["secondaries"].erase(at);
        break;
      }
    }
    return j;
  }

  /// A job; `named_core` gives it a lamination, which keeps the search short.
  nlohmann::json job(bool named_core) {
    const double va = std::pow(10.0, real(0.7, 2.8));
    nlohmann::json j{{"format", "turnwright-job/1"}, {"title", "random job"}};
    j["mains"] = {{"frequency", text(one_of<double>({50, 60}), "Hz")},
                  {"tolerance", text(one_of<double>({5, 6, 10}), "%")}};
    j["primary"] = primary();
    j["secondaries"] = secondaries(va);
    j["core"] = {{"steel", one_of<std::string>({"M400-50A", "M800-50A", "M-6", "M-19", "unknown", "M330-50A"})}};
    if (named_core) {
      static const std::vector<std::string> sizes{"EI 48",   "EI 60",       "EI 66",       "EI 78",  "EI 84", "EI 96",
                                                  "EI 105",  "EI 120",      "EI 150N",     "EI 130", "M 74",  "M 102",
                                                  "EI 1 in", "EI 1-1/4 in", "EI 1-1/2 in", "EI 2 in"};
      j["core"]["lamination"] = one_of(sizes);
      j["core"]["stack"] = text(real(18, 75), "mm");
    }
    if (chance(0.5))
      j["former"] = {{"kind", one_of<std::string>({"layers", "bobbin"})},
                     {"wound", one_of<std::string>({"hand", "machine"})}};
    if (chance(0.3)) j["wire"] = {{"system", one_of<std::string>({"metric", "awg", "swg"})}};
    if (chance(0.3)) j["limits"] = {{"temperature_rise", text(one_of<double>({40, 55, 70}), "K")}};
    if (chance(0.4))
      j["screens"] =
          nlohmann::json::array({{{"after", "primary"}, {"kind", one_of<std::string>({"noise", "safety"})}}});
    return j;
  }

 private:
  void rectify(nlohmann::json& w) {
    const std::string v = w["voltage"];
    const bool centre = v.find("-0-") != std::string::npos;
    const double volts = std::stod(v), dc = std::stod(w["current"].get<std::string>()) * (centre ? 0.8 : 0.45);
    w.erase("current");
    w["circuit"] = centre ? "full-wave centre-tap" : one_of<std::string>({"bridge", "half-wave", "full-wave doubler"});
    w["rectifier"] = one_of<std::string>({"silicon", "GZ34", "EZ81", "5Y3-GT", "1N4007"});
    if (w["circuit"] != "full-wave centre-tap") w["rectifier"] = "silicon";
    const double rail = volts * (w["circuit"] == "full-wave doubler" ? 2.5 : 1.2);
    nlohmann::json a{{"node", "A"},
                     {"capacitor", text(real(10, 60), "uF")},
                     {"load", {{"full", text(0.9 * dc, "mA")}, {"idle", text(0.5 * dc, "mA")}}}};
    nlohmann::json b{{"node", "B"}, {"capacitor", "32 uF"}, {"load", {text(0.1 * dc, "mA"), "470 kohm"}}};
    if (chance(0.5))
      b["through"] = {{"choke", text(real(3, 15), "H")}, {"resistance", text(0.02 * rail / dc * 1e3, "ohm")}};
    else
      b["through"] = {{"resistor", text(0.5 * rail / dc * 1e3, "ohm")}};
    w["rail"] = {a, b};
    if (chance(0.5)) {
      w.erase("voltage");
      w["target"] = {{"node", "A"}, {"voltage", text(rail, "V")}};
    } else if (chance(0.3)) {
      w["no_load_voltage"] = w["voltage"];
      w.erase("voltage");
    }
  }

  nlohmann::json primary() {
    const int sort = one_of<int>({0, 1, 2, 3, 4});
    if (sort == 0) return {{"taps", {"230 V"}}};
    if (sort == 1) return {{"taps", {"220 V", "230 V", "240 V"}}, {"on", "230 V"}};
    if (sort == 2) return {{"taps", {"120 V"}}};
    if (sort == 3) return {{"taps", {"100 V", "110 V", "120 V", "220 V", "230 V", "240 V"}}};
    const nlohmann::json half = nlohmann::json::array({"100 V", "120 V"});
    return {{"windings", nlohmann::json::array({half, half})},
            {"on", one_of<std::string>({"240 V", "120 V", "220 V"})}};
  }

  nlohmann::json secondaries(double va) {
    nlohmann::json list = nlohmann::json::array();
    if (chance(0.8)) {
      const double v = std::round(real(120, 420));
      const bool centre = chance(0.7);
      const std::string half = text(v, ""), volts = centre ? half + "-0-" + half + "V" : half + "V";
      std::string tidy;
      for (const char c : volts) {
        if (c != ' ') tidy += c;
      }
      tidy.insert(tidy.size() - 1, " ");
      list.push_back(
          {{"name", "HT"}, {"voltage", tidy}, {"current", text(0.5 * va / (centre ? 2 * v : v) * 1e3, "mA")}});
      if (chance(0.6)) {
        list.push_back({{"name", "rectifier heater"},
                        {"voltage", one_of<std::string>({"5 V", "6.3 V", "4 V"})},
                        {"current", text(one_of<double>({1, 1.9, 3}), "A")},
                        {"floats_on", "HT"}});
      }
      if (chance(0.4))
        list.push_back({{"name", "bias"},
                        {"tap_of", "HT"},
                        {"voltage", text(std::round(real(30, 70)), "V")},
                        {"current", "10 mA"}});
    }
    list.push_back({{"name", "heaters"},
                    {"voltage", one_of<std::string>({"6.3 V", "12.6 V", "4 V"})},
                    {"current", text(std::max(0.3, 0.4 * va / 6.3), "A")},
                    {"centre_tap", chance(0.5)}});
    return list;
  }

  std::mt19937 dice_;
};

}  // namespace turnwright::testing
