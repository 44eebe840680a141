// Placeholder until the drawing layer lands.
namespace brink::plot {}
