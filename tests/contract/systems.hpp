#pragma once

/// Files of the project that the contract tests run on.
namespace lightledger::contract {

inline constexpr const char* minimal = "systems/minimal.yaml";
inline constexpr const char* lidar = "systems/fog-bank-lidar.yaml";

} // namespace lightledger::contract
